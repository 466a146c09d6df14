import { tQuantile } from '@/shared/flow/statistics/distributions';
import { requireProbability } from '@/shared/flow/statistics/requireProbability';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import { sampleOf } from '@/shared/flow/statistics/sampleStatistics';

/** Which end of a sample is asked about: one named before looking, or whichever is farther out. */
export type GrubbsSide = 'highest' | 'lowest' | 'either';

/** Critical value of Grubbs' statistic: G = (n − 1)/√n · √(t²/(n − 2 + t²)), t at α/n, or α/2n when either end is asked.
 * @param count n, 3 or more @param side which end @param significance α, 0..1
 * @returns G, dimensionless @throws OutOfRangeError (a RangeError) for fewer than three values or a significance outside 0..1
 * Range: normal samples, n from 3. Source: NIST/SEMATECH e-Handbook 1.3.5.17.1.
 * @example grubbsCritical(8, 'highest', 0.05) // 2.032
 */
export function grubbsCritical(count: number, side: GrubbsSide, significance: number): number {
  if (!(Number.isInteger(count) && count >= 3))
    throw new OutOfRangeError('sample', 'The test needs at least three values.');
  requireProbability('significance', significance);
  const share = significance / (side === 'either' ? 2 * count : count);
  const t2 = tQuantile(1 - share, count - 2) ** 2;
  return ((count - 1) / Math.sqrt(count)) * Math.sqrt(t2 / (count - 2 + t2));
}

export type GrubbsResult = {
  /** how far out the value stands, in standard deviations */
  statistic: number;
  critical: number;
  /** place of the value in the list */
  index: number;
  isOutlier: boolean;
};

/** Grubbs' test for one outlier: G = max|x − x̄|/s against its critical value.
 * @param values three or more, one unit @param options `side`, either by default; `significance` 0..1, 0.05 by default
 * @returns statistic, critical value, place and verdict; values all alike give a statistic of 0 and no outlier
 * @throws OutOfRangeError (a RangeError) for fewer than three values or one that is not finite
 * Range: normal but for the one value. Source: NIST/SEMATECH e-Handbook 1.3.5.17.1.
 * @example grubbs([199.31, 199.53, 200.19, 200.82, 201.92, 201.95, 202.18, 245.57], { side: 'highest' }).statistic // 2.46876
 */
export function grubbs(
  values: readonly number[],
  options: { side?: GrubbsSide; significance?: number } = {},
): GrubbsResult {
  const side = options.side ?? 'either';
  const critical = grubbsCritical(values.length, side, options.significance ?? 0.05);
  const { mean, standardDeviation } = sampleOf(values);
  const out = values.map((value) => {
    if (side === 'highest') return value - mean;
    return side === 'lowest' ? mean - value : Math.abs(value - mean);
  });
  const farthest = Math.max(...out);
  const statistic = standardDeviation ? farthest / standardDeviation : 0;
  return { statistic, critical, index: out.indexOf(farthest), isOutlier: statistic > critical };
}
