/**
 * Charts of a bench's checks on one reference. Purpose: own history proves **steady**, a fixed tolerance to the
 * reference proves **right**; a check has to be both. Points: one a set-up or day, oldest first, since the last
 * adjustment. Invariants: limits never narrower than the resolution; below 15 points the stated tolerance governs,
 * because limits from few points cry wolf (5.8 % false alarms a check from 5 points).
 */
import { normalCdf, tQuantile } from '@/shared/flow/statistics/distributions';
import { OutOfRangeError, finite, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** E|difference of two values|/σ for normal values: 2/√π, as printed 1.128. */
const movingRangePerSd = 1.128;
/** Number of points from which a bench's own history sets its limits. */
const enoughPoints = 15;

export type ChartLimits = { centre: number; lower: number; upper: number };
export type IndividualsLimits = ChartLimits & { movingRangeMean: number; sd: number };

/** Individuals chart: centre x̄, limits x̄ ± 3·MR̄/1.128, MR̄ the mean of |x_i − x_(i−1)|.
 * @param values two or more, oldest first, one unit @returns centre, limits, MR̄ and MR̄/1.128 in that unit
 * @throws OutOfRangeError (a RangeError) for fewer than two values or one that is not finite
 * Range: independent points; honest from about 15 on. Source: NIST/SEMATECH e-Handbook 6.3.2.2.
 * @example individualsLimits([49.6, 47.6, 49.9, 51.3, 47.8, 51.2, 52.6, 52.4, 53.6, 52.1]).upper // 55.8041
 */
export function individualsLimits(values: readonly number[]): IndividualsLimits {
  if (values.length < 2) throw new OutOfRangeError('points', 'A chart needs at least two points.');
  values.forEach((value) => finite(value, 'point'));
  const centre = values.reduce((sum, value) => sum + value, 0) / values.length;
  let ranges = 0;
  values.forEach((value, i) => {
    ranges += i === 0 ? 0 : Math.abs(value - (values[i - 1] ?? value));
  });
  const movingRangeMean = ranges / (values.length - 1);
  const sd = movingRangeMean / movingRangePerSd;
  return { centre, lower: centre - 3 * sd, upper: centre + 3 * sd, movingRangeMean, sd };
}

/** Degrees of freedom of a spread taken from the mean moving range: ν = 1/(2·CV²), CV from the variance of |d| and the
 * covariance of neighbours, both of normal values.
 * @param count number of points, 2 or more @returns ν, a count (about 0.6 per point)
 * @throws OutOfRangeError (a RangeError) for fewer than two points
 * Range: independent normal points. Source: derived from E|d1·d2| of a bivariate normal pair with correlation −½.
 * @example movingRangeFreedom(15) // 8.66
 */
export function movingRangeFreedom(count: number): number {
  if (!(Number.isInteger(count) && count >= 2))
    throw new OutOfRangeError('points', 'A moving range needs two points.');
  const ranges = count - 1;
  const squaredMean = 4 / Math.PI;
  const variance = 2 - squaredMean;
  const neighbours = squaredMean * (Math.sqrt(3) / 2 + Math.PI / 12 - 1);
  const ofMean = (ranges * variance + 2 * (ranges - 1) * neighbours) / ranges ** 2;
  return squaredMean / (2 * ofMean);
}

export type CheckLimits = ChartLimits & {
  /** what set the limits: the stated tolerance, the bench's own history, or the step of the instrument */
  governedBy: 'tolerance' | 'history' | 'resolution';
  sentence: string;
};

/** Limits for the next check. Below 15 points: mean of the points (or the reference, when there are none) ± tolerance.
 * From 15 on: mean ± t·(MR̄/1.128)·√(1 + 1/n), t at the probability of 3 σ (0.27 % outside). Never narrower than one step.
 * @param history earlier checks, oldest first @param given in the same unit: `reference` its known flow, `tolerance` half
 *   width above 0, `resolution` step of the instrument, 0 or above
 * @returns limits in that unit, and what governed them @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: one point a set-up or day. Source: individualsLimits; prediction interval of e-Handbook 4.5.1.2.
 * @example checkLimits([200, 202], { reference: 200, tolerance: 3, resolution: 1 }).upper // 204
 */
export function checkLimits(
  history: readonly number[],
  given: { reference: number; tolerance: number; resolution: number },
): CheckLimits {
  finite(given.reference, 'reference');
  positive(given.tolerance, 'tolerance');
  zeroOrMore(given.resolution, 'resolution');
  history.forEach((value) => finite(value, 'point'));
  const count = history.length;
  if (count < enoughPoints) {
    const centre = count === 0 ? given.reference : history.reduce((sum, value) => sum + value, 0) / count;
    const half = Math.max(given.tolerance, given.resolution);
    return {
      centre,
      lower: centre - half,
      upper: centre + half,
      governedBy: 'tolerance',
      sentence: `${count} of ${enoughPoints} points: the stated tolerance governs.`,
    };
  }
  const { centre, sd } = individualsLimits(history);
  const own = tQuantile(normalCdf(3), movingRangeFreedom(count)) * sd * Math.sqrt(1 + 1 / count);
  const half = Math.max(own, given.resolution);
  const byHistory = own >= given.resolution;
  return {
    centre,
    lower: centre - half,
    upper: centre + half,
    governedBy: byHistory ? 'history' : 'resolution',
    sentence: byHistory
      ? `Limits from this bench’s own ${count} checks.`
      : `The ${count} checks hardly differ: one step of the instrument is the limit.`,
  };
}

export type CheckVerdict = { isSteady: boolean; isRight: boolean; limits: CheckLimits };

/** Judges one check: steady when inside the limits of the bench's own history, right when within tolerance of the
 * reference: |x − reference| ≤ tolerance.
 * @param value the new check @param history earlier ones, without it, oldest first
 * @param given `reference`, `tolerance`, `resolution` as checkLimits, the same unit
 * @returns both verdicts and the limits @throws OutOfRangeError (a RangeError) as checkLimits
 * Range: as checkLimits. Source: as checkLimits.
 * @example judgeCheck(204.5, [200, 202], { reference: 200, tolerance: 3, resolution: 1 }).isSteady // false
 */
export function judgeCheck(
  value: number,
  history: readonly number[],
  given: { reference: number; tolerance: number; resolution: number },
): CheckVerdict {
  finite(value, 'check');
  const limits = checkLimits(history, given);
  return {
    isSteady: value >= limits.lower && value <= limits.upper,
    isRight: Math.abs(value - given.reference) <= given.tolerance,
    limits,
  };
}

export type EwmaChart = {
  /** the weighted averages, one a point */
  averages: number[];
  centre: number;
  lower: number;
  upper: number;
  /** places of the averages outside the limits */
  outside: number[];
};

/** EWMA chart, which sees a slow drift: z_i = λx_i + (1 − λ)z_(i−1), z_0 = target; limits target ± L·s·√(λ/(2 − λ)).
 * @param values oldest first, one unit @param given same unit: `target`, `sd` of a single point (0 or above);
 *   `lambda` 0..1, 0.3 by default; `widthInSd` L, 3 by default; `resolution` floor of the half width, 0 by default
 * @returns averages, limits and the places outside them @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: independent points. Source: NIST/SEMATECH e-Handbook 6.3.2.4.
 * @example ewmaChart([52, 47, 53], { target: 50, sd: 2.0539 }).averages[2] // 50.56
 */
export function ewmaChart(
  values: readonly number[],
  given: { target: number; sd: number; lambda?: number; widthInSd?: number; resolution?: number },
): EwmaChart {
  const centre = finite(given.target, 'target');
  const lambda = given.lambda ?? 0.3;
  if (!(lambda > 0 && lambda <= 1)) throw new OutOfRangeError('lambda', 'Lambda must lie in 0..1.');
  const width = positive(given.widthInSd ?? 3, 'width');
  const own = width * zeroOrMore(given.sd, 'standard deviation') * Math.sqrt(lambda / (2 - lambda));
  const half = Math.max(own, zeroOrMore(given.resolution ?? 0, 'resolution'));
  let z = centre;
  const averages = values.map((value) => (z = lambda * finite(value, 'point') + (1 - lambda) * z));
  const outside = averages.flatMap((average, i) => (Math.abs(average - centre) > half ? [i] : []));
  return { averages, centre, lower: centre - half, upper: centre + half, outside };
}
