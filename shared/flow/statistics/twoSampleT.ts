import { tCdf, tQuantile } from '@/shared/flow/statistics/distributions';
import { requireProbability } from '@/shared/flow/statistics/requireProbability';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import { sampleOf } from '@/shared/flow/statistics/sampleStatistics';

export type TwoSampleT = {
  /** mean of the first less mean of the second, in the unit of the values */
  difference: number;
  /** standard uncertainty of that difference, same unit */
  standardUncertainty: number;
  t: number;
  degreesOfFreedom: number;
  /** |t| above this is a difference at the level asked for */
  critical: number;
  /** probability of a |t| at least as large when the means are alike, 0..1 */
  pValue: number;
  differs: boolean;
};

/** Two-sample t test: t = (x̄1 − x̄2)/u, u² = s²(1/n1 + 1/n2) pooled, or s1²/n1 + s2²/n2 (Welch).
 * @param first two values or more @param second two values or more, the same unit
 * @param options `equalSpread` pools the spreads (ν = n1 + n2 − 2), otherwise Welch-Satterthwaite; `level` 0..1, 0.95
 * @returns t, ν, critical value and verdict
 * @throws OutOfRangeError (a RangeError) when a sample has fewer than two values, or neither sample spreads
 * Range: roughly normal samples. Source: NIST/SEMATECH e-Handbook 1.3.5.3.
 * @example twoSampleT([5, 7, 9], [1, 2, 3], { equalSpread: true }).t // 3.8729833
 */
export function twoSampleT(
  first: readonly number[],
  second: readonly number[],
  options: { equalSpread: boolean; level?: number },
): TwoSampleT {
  const level = requireProbability('level', options.level ?? 0.95);
  const a = sampleOf(first);
  const b = sampleOf(second);
  if (a.standardDeviation === null || b.standardDeviation === null)
    throw new OutOfRangeError('sample', 'Each sample needs at least two values.');
  const va = a.standardDeviation ** 2 / a.count;
  const vb = b.standardDeviation ** 2 / b.count;
  if (va + vb === 0)
    throw new OutOfRangeError('sample', 'Neither sample spreads: there is nothing to judge a difference by.');
  const pooled = a.count + b.count - 2;
  const pooledVariance =
    ((a.count - 1) * a.standardDeviation ** 2 + (b.count - 1) * b.standardDeviation ** 2) / pooled;
  const degreesOfFreedom = options.equalSpread
    ? pooled
    : (va + vb) ** 2 / (va ** 2 / (a.count - 1) + vb ** 2 / (b.count - 1));
  const standardUncertainty = Math.sqrt(
    options.equalSpread ? pooledVariance * (1 / a.count + 1 / b.count) : va + vb,
  );
  const difference = a.mean - b.mean;
  const t = difference / standardUncertainty;
  const critical = tQuantile((1 + level) / 2, degreesOfFreedom);
  const pValue = 2 * tCdf(-Math.abs(t), degreesOfFreedom);
  return {
    difference,
    standardUncertainty,
    t,
    degreesOfFreedom,
    critical,
    pValue,
    differs: Math.abs(t) > critical,
  };
}
