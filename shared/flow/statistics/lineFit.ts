import { chiSquaredQuantile, tQuantile } from '@/shared/flow/statistics/distributions';
import { requireProbability } from '@/shared/flow/statistics/requireProbability';
import { OutOfRangeError, finite, positive } from '@/shared/units/outOfRange';

/** One point of a fit. `u` is the standard uncertainty of y, in the unit of y; either every point states one or none. */
export type FitPoint = { x: number; y: number; u?: number };

/** A fitted line y = intercept + slope·x, or y = slope·x with an intercept of exactly 0. */
export type Fit = {
  kind: 'line' | 'throughZero';
  intercept: number;
  slope: number;
  /** standard uncertainties of the coefficients; null when there is no point to spare and no stated uncertainty */
  interceptSd: number | null;
  slopeSd: number | null;
  /** correlation of intercept and slope, −1..1; 0 through zero */
  correlation: number;
  /** y − fitted y, in the unit of y, in the order of the points */
  residuals: number[];
  /** √(Σr²/ν), in the unit of y; null when no degree of freedom is left */
  residualSd: number | null;
  /** Σ(r/u)² where uncertainties are stated, else null, with the value that 95 % of sound fits stay below */
  chiSquared: number | null;
  chiSquaredLimit: number | null;
  degreesOfFreedom: number;
  /** weighted centre of x: there the line's level and its slope are independent of each other */
  centreX: number;
  /** standard uncertainty of the line at centreX; null as above */
  centreSd: number | null;
  /** true when the uncertainties of the coefficients come from stated ones, not from the residuals */
  hasStatedUncertainty: boolean;
};

function weightsOf(points: readonly FitPoint[]): { weights: number[]; stated: boolean } {
  points.forEach(({ x, y }) => {
    finite(x, 'x');
    finite(y, 'y');
  });
  const statedCount = points.filter(({ u }) => u !== undefined).length;
  if (statedCount !== 0 && statedCount !== points.length)
    throw new OutOfRangeError('points', 'Either every point states its uncertainty or none does.');
  const weights = points.map(({ u }) => (u === undefined ? 1 : 1 / positive(u, 'uncertainty') ** 2));
  return { weights, stated: statedCount > 0 };
}

/** What both fits share once the coefficients are known. */
function finish(
  points: readonly FitPoint[],
  weights: readonly number[],
  stated: boolean,
  line: { kind: Fit['kind']; intercept: number; slope: number; centreX: number },
) {
  const residuals = points.map(({ x, y }) => y - line.intercept - line.slope * x);
  const degreesOfFreedom = points.length - (line.kind === 'line' ? 2 : 1);
  const weighted = residuals.reduce((sum, r, i) => sum + (weights[i] ?? 0) * r * r, 0);
  const plain = residuals.reduce((sum, r) => sum + r * r, 0);
  const spare = degreesOfFreedom > 0;
  const residualSd = spare ? Math.sqrt(plain / degreesOfFreedom) : null;
  return {
    ...line,
    residuals,
    degreesOfFreedom,
    residualSd,
    chiSquared: stated ? weighted : null,
    chiSquaredLimit: stated && spare ? chiSquaredQuantile(0.95, degreesOfFreedom) : null,
    hasStatedUncertainty: stated,
    /** what a unit of weight is uncertain by */
    unit: stated ? 1 : residualSd,
  };
}

/** Straight line by (weighted) least squares: slope = Σw(x − x̄)(y − ȳ)/Σw(x − x̄)², intercept = ȳ − slope·x̄, w = 1/u².
 * Coefficients are uncertain by the stated u where points have one, otherwise by the spread of the residuals.
 * @param points two or more, at two different x at least; x and y any units, u in the unit of y
 * @returns the fit; slope in y per x @throws OutOfRangeError (a RangeError) for fewer points, one x only, or a bad number
 * Range: x taken as exact. Source: ISO/TS 28037:2010 clause 6; GUM H.3; NIST StRD Norris.
 * @example fitLine([{ x: 1, y: 3.3 }, { x: 2, y: 5.6 }, { x: 3, y: 7.1 }]).slope // 1.9
 */
export function fitLine(points: readonly FitPoint[]): Fit {
  if (points.length < 2) throw new OutOfRangeError('points', 'A line needs at least two points.');
  const { weights, stated } = weightsOf(points);
  const sum = (value: (point: FitPoint) => number) =>
    points.reduce((total, point, i) => total + (weights[i] ?? 0) * value(point), 0);
  const total = sum(() => 1);
  const centreX = sum(({ x }) => x) / total;
  const centreY = sum(({ y }) => y) / total;
  const spreadX = sum(({ x }) => (x - centreX) ** 2);
  const first = points[0]?.x;
  if (!(spreadX > 0) || points.every(({ x }) => x === first))
    throw new OutOfRangeError('points', 'A line needs two different x.');
  const slope = sum(({ x, y }) => (x - centreX) * (y - centreY)) / spreadX;
  const intercept = centreY - slope * centreX;
  const { unit, ...fit } = finish(points, weights, stated, { kind: 'line', intercept, slope, centreX });
  const slopeVariance = 1 / spreadX;
  const interceptVariance = 1 / total + centreX ** 2 / spreadX;
  return {
    ...fit,
    interceptSd: unit === null ? null : unit * Math.sqrt(interceptVariance),
    slopeSd: unit === null ? null : unit * Math.sqrt(slopeVariance),
    centreSd: unit === null ? null : unit / Math.sqrt(total),
    correlation: (-centreX * slopeVariance) / Math.sqrt(slopeVariance * interceptVariance),
  };
}

/** Line through zero by (weighted) least squares: slope = Σwxy/Σwx², w = 1/u².
 * @param points one or more, not all at x = 0; x and y any units, u in the unit of y
 * @returns the fit, its intercept exactly 0 @throws OutOfRangeError (a RangeError) for no point, x all 0, or a bad number
 * Range: x taken as exact, y in truth proportional to x. Source: NIST StRD NoInt1; weighted as ISO/TS 28037.
 * @example fitThroughZero([{ x: 60, y: 130 }, { x: 70, y: 140 }]).slope // 2.0705882
 */
export function fitThroughZero(points: readonly FitPoint[]): Fit {
  if (points.length < 1) throw new OutOfRangeError('points', 'A line through zero needs at least one point.');
  const { weights, stated } = weightsOf(points);
  const xx = points.reduce((total, { x }, i) => total + (weights[i] ?? 0) * x * x, 0);
  if (!(xx > 0)) throw new OutOfRangeError('points', 'A line through zero needs a point away from zero.');
  const slope = points.reduce((total, { x, y }, i) => total + (weights[i] ?? 0) * x * y, 0) / xx;
  const line = { kind: 'throughZero' as const, intercept: 0, slope, centreX: 0 };
  const { unit, ...fit } = finish(points, weights, stated, line);
  return {
    ...fit,
    interceptSd: 0,
    slopeSd: unit === null ? null : unit / Math.sqrt(xx),
    centreSd: 0,
    correlation: 0,
  };
}

/** The line's value at one x, with the standard uncertainty of the line itself there; null when it is not known. */
export type FittedValue = { y: number; lineSd: number | null };

/** Value of a fitted line: y = intercept + slope·x, u² = u_centre² + (x − x_centre)²·u_slope².
 * @param fit a fit @param x where, in the unit of the points' x
 * @returns y and the line's own standard uncertainty there, in the unit of y @throws OutOfRangeError (a RangeError) unless x is finite
 * Range: inside the points; beyond them u grows with the distance and the line itself is a guess.
 * Source: GUM H.3.4; ISO/TS 28037:2010 clause 6.
 * @example valueOnLine(fitLine([{ x: 0, y: 1 }, { x: 1, y: 3 }, { x: 2, y: 4 }]), 3).lineSd // 0.623610
 */
export function valueOnLine(fit: Fit, x: number): FittedValue {
  finite(x, 'x');
  const y = fit.intercept + fit.slope * x;
  if (fit.slopeSd === null || fit.centreSd === null) return { y, lineSd: null };
  return { y, lineSd: Math.hypot(fit.centreSd, (x - fit.centreX) * fit.slopeSd) };
}

export type PredictionInterval = { y: number; lower: number; upper: number; halfWidth: number };

/** Interval for one new observation: y ± t_{ν}·√(u_line² + s²); with stated uncertainties the normal quantile and u_new.
 * @param fit a fit @param x where @param options `level` 0..1, 0.95 by default; `newUncertainty` of the new observation in
 *   the unit of y, needed where the points state theirs, otherwise the residual spread is taken
 * @returns centre, ends and half width in the unit of y, or null when no spread is known
 * @throws OutOfRangeError (a RangeError) for a bad level, x or uncertainty, or a missing `newUncertainty`
 * Range: normal errors. Source: NIST/SEMATECH e-Handbook 4.5.1.2 and 2.3.6.7.
 * @example predictionInterval(fitLine([{ x: 0, y: 1 }, { x: 1, y: 3 }, { x: 2, y: 4 }]), 1).halfWidth // 5.98976
 */
export function predictionInterval(
  fit: Fit,
  x: number,
  options: { level?: number; newUncertainty?: number } = {},
): PredictionInterval | null {
  const level = requireProbability('level', options.level ?? 0.95);
  if (fit.hasStatedUncertainty && options.newUncertainty === undefined)
    throw new OutOfRangeError('points', 'State the uncertainty of the new observation.');
  const { y, lineSd } = valueOnLine(fit, x);
  const own = options.newUncertainty === undefined ? fit.residualSd : options.newUncertainty;
  if (lineSd === null || own === null) return null;
  finite(own, 'uncertainty');
  const freedom = fit.hasStatedUncertainty ? Infinity : fit.degreesOfFreedom;
  const halfWidth = tQuantile((1 + level) / 2, freedom) * Math.hypot(lineSd, own);
  return { y, lower: y - halfWidth, upper: y + halfWidth, halfWidth };
}
