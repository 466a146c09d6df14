import { tQuantile } from '@/shared/flow/statistics/distributions';
import { sampleOf } from '@/shared/flow/statistics/sampleStatistics';
import { OutOfRangeError, finite, zeroOrMore } from '@/shared/units/outOfRange';

/** Standard uncertainty of a reading on an instrument with a step: u = a/√12.
 * @param step smallest step of the instrument, any unit, 0 or above
 * @returns u in that unit @throws OutOfRangeError (a RangeError) for a negative step
 * Range: any. Source: GUM (JCGM 100:2008) F.2.2.1.
 * @example resolutionUncertainty(1) // 0.28867513
 */
export function resolutionUncertainty(step: number): number {
  return zeroOrMore(step, 'step of the instrument') / Math.sqrt(12);
}

/** Standard uncertainty of a value that lies anywhere within ± a half width: u = a/√3.
 * @param halfWidth a, any unit, 0 or above @returns u in that unit @throws OutOfRangeError (a RangeError) for a negative one
 * Range: any. Source: GUM 4.3.7.
 * @example rectangularUncertainty(0.001) // 0.00057735
 */
export function rectangularUncertainty(halfWidth: number): number {
  return zeroOrMore(halfWidth, 'half width') / Math.sqrt(3);
}

/** Type A evaluation: u = s/√n of the mean of n repeats.
 * @param values two or more repeats, one unit
 * @returns mean, standard uncertainty of the mean, both in that unit, and ν = n − 1
 * @throws OutOfRangeError (a RangeError) for fewer than two values or one that is not finite
 * Range: independent repeats. Source: GUM 4.2.3.
 * @example typeAUncertainty([241, 242, 243]).standardUncertainty // 0.57735027
 */
export function typeAUncertainty(values: readonly number[]): {
  mean: number;
  standardUncertainty: number;
  degreesOfFreedom: number;
} {
  const { mean, standardDeviation, count } = sampleOf(values);
  if (standardDeviation === null)
    throw new OutOfRangeError('repeats', 'A spread needs at least two repeats.');
  return { mean, standardUncertainty: standardDeviation / Math.sqrt(count), degreesOfFreedom: count - 1 };
}

/** Root of the sum of squares: √Σx². Independent errors add by it.
 * @param values any number of values of one unit
 * @returns the root in that unit, 0 for no values @throws OutOfRangeError (a RangeError) for one that is not finite
 * Range: magnitudes from 1e-150 to 1e150. Source: GUM 5.1.2. Math.hypot is ten times slower over a budget.
 * @example rootSumSquares([3, 4]) // 5
 */
export function rootSumSquares(values: readonly number[]): number {
  let sum = 0;
  for (const value of values) sum += finite(value, 'contribution') ** 2;
  return Math.sqrt(sum);
}

/** One input of a propagation: its sensitivity ∂f/∂x and its standard uncertainty. */
export type Term = { sensitivity: number; standardUncertainty: number };

/** Law of propagation: u² = Σ(c_i·u_i)² + 2ΣΣ c_i·c_j·u_i·u_j·r_ij.
 * @param terms sensitivity and standard uncertainty of each input, in units that multiply to the unit of the result
 * @param correlation r_ij of inputs i < j, −1..1; none by default
 * @returns combined standard uncertainty @throws OutOfRangeError (a RangeError) for bad numbers or a correlation past ±1
 * Range: where f is near enough straight over ± u. Source: GUM 5.1.2 and 5.2.2.
 * @example propagate([{ sensitivity: 2, standardUncertainty: 3 }, { sensitivity: 1, standardUncertainty: 8 }]) // 10
 */
export function propagate(
  terms: readonly Term[],
  correlation: (i: number, j: number) => number = () => 0,
): number {
  const shares = terms.map(
    ({ sensitivity, standardUncertainty }) =>
      finite(sensitivity, 'sensitivity') * zeroOrMore(standardUncertainty, 'standard uncertainty'),
  );
  let variance = 0;
  shares.forEach((share, i) => {
    variance += share * share;
    for (let j = i + 1; j < shares.length; j++) {
      const r = correlation(i, j);
      if (!(Math.abs(r) <= 1))
        throw new OutOfRangeError('correlation', 'A correlation must lie between -1 and 1.');
      variance += 2 * r * share * (shares[j] ?? 0);
    }
  });
  return Math.sqrt(Math.max(0, variance));
}

/** Sensitivities by central differences: c_i = (f(x + u_i) − f(x − u_i))/(2u_i).
 * @param f the formula @param inputs its inputs, each with its standard uncertainty, which is the step
 * @returns one sensitivity an input; 0 where the standard uncertainty is 0
 * @throws OutOfRangeError (a RangeError) when f answers with a number that is not finite
 * Range: steps that stay inside the range of f. Source: GUM 5.1.3, note 2.
 * @example sensitivitiesOf(([x = 0]) => x * x, [{ value: 3, standardUncertainty: 0.1 }])[0] // 6.000000
 */
export function sensitivitiesOf(
  f: (inputs: readonly number[]) => number,
  inputs: readonly { value: number; standardUncertainty: number }[],
): number[] {
  const values = inputs.map(({ value }) => value);
  return inputs.map(({ value, standardUncertainty: step }, i) => {
    if (step === 0) return 0;
    const at = (x: number) => finite(f(values.map((other, k) => (k === i ? x : other))), 'result');
    return (at(value + step) - at(value - step)) / (2 * step);
  });
}

/** Effective degrees of freedom: ν = u⁴/Σ(u_i⁴/ν_i), u² = Σu_i².
 * @param parts contribution of each input to u, in one unit, and its degrees of freedom, infinity allowed
 * @returns ν, not rounded, infinity when nothing is estimated from few values
 * @throws OutOfRangeError (a RangeError) for degrees of freedom that are not above 0
 * Range: independent parts. Source: GUM G.4.1, Welch-Satterthwaite.
 * @example effectiveFreedom([{ contribution: 3, degreesOfFreedom: 9 }, { contribution: 4, degreesOfFreedom: Infinity }]) // 69.4444
 */
export function effectiveFreedom(
  parts: readonly { contribution: number; degreesOfFreedom: number }[],
): number {
  let variance = 0;
  let weighted = 0;
  for (const { contribution, degreesOfFreedom } of parts) {
    if (!(degreesOfFreedom > 0))
      throw new OutOfRangeError('degrees of freedom', 'Degrees of freedom must be above 0.');
    const square = finite(contribution, 'contribution') ** 2;
    variance += square;
    weighted += square ** 2 / degreesOfFreedom;
  }
  // squares of squares of a flow in m³/s reach 1e-30: compare with 0, not with a step
  return weighted === 0 ? Infinity : variance ** 2 / weighted;
}

/** Coverage factors at 95 % already worked out, by whole degrees of freedom: a session asks for the same few each time. */
const factorsAt95 = new Map<number, number>();

function coverageFactorAt(level: number, degreesOfFreedom: number): number {
  const known = level === 0.95 ? factorsAt95.get(degreesOfFreedom) : undefined;
  const factor = known ?? tQuantile((1 + level) / 2, degreesOfFreedom);
  if (level === 0.95 && degreesOfFreedom < 10_000) factorsAt95.set(degreesOfFreedom, factor);
  return factor;
}

export type Expanded = { coverageFactor: number; expandedUncertainty: number; degreesOfFreedom: number };

/** Expanded uncertainty: U = k·u, k = t((1 + level)/2, ν), ν cut to a whole number as the GUM does, 1 at least.
 * @param standardUncertainty u, any unit, 0 or above @param degreesOfFreedom ν, above 0, infinity allowed
 * @param level share of truths inside ± U, 0..1, 0.95 by default
 * @returns k, U in the unit of u, and the ν used @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: results near enough normal. Source: GUM G.3.2 and G.4.1.
 * @example expandedUncertainty(2, 10).expandedUncertainty // 4.4562777
 */
export function expandedUncertainty(
  standardUncertainty: number,
  degreesOfFreedom: number,
  level = 0.95,
): Expanded {
  zeroOrMore(standardUncertainty, 'standard uncertainty');
  // a hair is added so that 16 computed as 15.9999999 stays 16
  const whole = Math.max(1, Math.floor(degreesOfFreedom + 1e-9));
  const coverageFactor = coverageFactorAt(level, whole);
  return {
    coverageFactor,
    expandedUncertainty: coverageFactor * standardUncertainty,
    degreesOfFreedom: whole,
  };
}
