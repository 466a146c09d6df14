import { OutOfRangeError, finite } from '@/shared/units/outOfRange';

/** Mean and spread of one sample. `standardDeviation` is null for a single value: one pull says nothing of spread. */
export type Sample = { mean: number; standardDeviation: number | null; count: number };

/** Mean and experimental standard deviation: s² = Σ(x − x̄)²/(n − 1), by two passes.
 * @param values one value or more, one unit for all @returns mean and s in that unit, count
 * @throws OutOfRangeError (a RangeError) for no value or one that is not finite
 * Range: any. Source: GUM (JCGM 100:2008) 4.2.1 and 4.2.2.
 * @example sampleOf([241.2, 241.9, 241.5]).standardDeviation // 0.351188
 */
export function sampleOf(values: readonly number[]): Sample {
  if (values.length === 0) throw new OutOfRangeError('sample', 'A sample needs at least one value.');
  values.forEach((value) => finite(value, 'value'));
  const count = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / count;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { mean, standardDeviation: count > 1 ? Math.sqrt(squares / (count - 1)) : null, count };
}

/** A spread with the degrees of freedom behind it. */
export type Spread = { standardDeviation: number; degreesOfFreedom: number };

/** Repeatability pooled over groups of repeats: s² = Σ(n − 1)s²/Σ(n − 1).
 * @param groups one list of repeats a group (the same port, lift and set-up), one unit for all
 * @returns s in that unit and its degrees of freedom, or null when no group has two values
 * @throws OutOfRangeError (a RangeError) for a value that is not finite
 * Range: any. Groups of unlike spread (quiet and loud lifts) are pooled apart by the caller.
 * Source: ISO 5725-2:2019 7.4.4; NIST e-Handbook 2.4.3.1; GUM H.3.6 for the idea.
 * @example pooledRepeatability([[10, 12], [20, 21, 22]]).standardDeviation // 1.1547005
 */
export function pooledRepeatability(groups: readonly (readonly number[])[]): Spread | null {
  let squares = 0;
  let degreesOfFreedom = 0;
  for (const group of groups) {
    if (group.length < 2) continue;
    const { mean, count } = sampleOf(group);
    squares += group.reduce((sum, value) => sum + (value - mean) ** 2, 0);
    degreesOfFreedom += count - 1;
  }
  return degreesOfFreedom === 0
    ? null
    : { standardDeviation: Math.sqrt(squares / degreesOfFreedom), degreesOfFreedom };
}

/** Repeatability as a share of the flow, pooled over lifts of different flow: each group divided by its own mean first.
 * @param groups one list of repeats a group, each above 0, a unit of its own each group if need be
 * @returns relative s, 0..1, and its degrees of freedom, or null when no group has two values
 * @throws OutOfRangeError (a RangeError) for a value that is not above 0
 * Range: spreads below 10 %. Source: as pooledRepeatability; relative form for a spread that grows with the flow.
 * @example pooledRelativeRepeatability([[99, 101], [198, 202]]).standardDeviation // 0.014142136
 */
export function pooledRelativeRepeatability(groups: readonly (readonly number[])[]): Spread | null {
  return pooledRepeatability(
    groups.map((group) => {
      if (group.length === 0) return group;
      if (group.some((value) => !(value > 0))) throw new OutOfRangeError('sample', 'A flow must be above 0.');
      const { mean } = sampleOf(group);
      return group.map((value) => value / mean);
    }),
  );
}
