import { OutOfRangeError, finite } from '@/shared/units/outOfRange';

/** A curve through points that never swings past them: cubic pieces, one slope a point. */
export type Pchip = { xs: readonly number[]; ys: readonly number[]; slopes: readonly number[] };

/** Slope at an end by the one-sided three-point formula, held to the sign and three times the first secant. */
function endSlope(h0: number, h1: number, secant0: number, secant1: number): number {
  const slope = ((2 * h0 + h1) * secant0 - h0 * secant1) / (h0 + h1);
  if (Math.sign(slope) !== Math.sign(secant0)) return 0;
  if (Math.sign(secant0) !== Math.sign(secant1) && Math.abs(slope) > 3 * Math.abs(secant0))
    return 3 * secant0;
  return slope;
}

/** Slopes of the shape-keeping curve: inside the weighted harmonic mean of the two secants, 0 where they change sign;
 * (w1 + w2)/(w1/δ1 + w2/δ2), w1 = 2h2 + h1, w2 = h2 + 2h1; at the ends the held three-point formula.
 * @param xs two or more, rising, any unit @param ys as many, any unit @returns slopes, unit of y per unit of x
 * @throws OutOfRangeError (a RangeError) unless the lists match, x rises and every number is finite
 * Range: any rising x. Source: Fritsch and Carlson, SIAM J. Numer. Anal. 17 (1980) 238; Fritsch and Butland, SIAM J. Sci.
 * Stat. Comput. 5 (1984) 300; end conditions as SciPy's PchipInterpolator.
 * @example pchipSlopes([0, 1, 2], [0, 1, 4])[1] // 1.5
 */
export function pchipSlopes(xs: readonly number[], ys: readonly number[]): number[] {
  if (xs.length < 2 || xs.length !== ys.length)
    throw new OutOfRangeError('curve', 'A curve needs two points or more, with a value each.');
  const last = xs.length - 1;
  const widths = new Array<number>(last).fill(0);
  const secants = new Array<number>(last).fill(0);
  // plain loops: the uncertainty of a figure asks for these slopes hundreds of times a session
  for (let i = 0; i <= last; i++) {
    finite(xs[i] ?? Number.NaN, 'x');
    finite(ys[i] ?? Number.NaN, 'y');
  }
  for (let i = 0; i < last; i++) {
    const width = (xs[i + 1] ?? 0) - (xs[i] ?? 0);
    if (!(width > 0)) throw new OutOfRangeError('curve', 'The x of a curve must rise.');
    widths[i] = width;
    secants[i] = ((ys[i + 1] ?? 0) - (ys[i] ?? 0)) / width;
  }
  const slopes = new Array<number>(last + 1).fill(0);
  if (last === 1) return slopes.fill(secants[0] ?? 0);
  for (let i = 1; i < last; i++) {
    const before = secants[i - 1] ?? 0;
    const after = secants[i] ?? 0;
    if (before * after <= 0) continue;
    const [h1, h2] = [widths[i - 1] ?? 0, widths[i] ?? 0];
    const w1 = 2 * h2 + h1;
    const w2 = h2 + 2 * h1;
    slopes[i] = (w1 + w2) / (w1 / before + w2 / after);
  }
  slopes[0] = endSlope(widths[0] ?? 0, widths[1] ?? 0, secants[0] ?? 0, secants[1] ?? 0);
  const [end, before] = [last - 1, last - 2];
  slopes[last] = endSlope(widths[end] ?? 0, widths[before] ?? 0, secants[end] ?? 0, secants[before] ?? 0);
  return slopes;
}

/** Curve through points by pchipSlopes.
 * @param xs two or more, rising, any unit @param ys as many, any unit
 * @returns the curve @throws OutOfRangeError (a RangeError) as pchipSlopes
 * Range: any rising x. Source: as pchipSlopes.
 * @example pchip([0, 1, 2], [0, 1, 4]).slopes[1] // 1.5
 */
export function pchip(xs: readonly number[], ys: readonly number[]): Pchip {
  return { xs: [...xs], ys: [...ys], slopes: pchipSlopes(xs, ys) };
}

/** Place of the piece that holds x: the i with x_i ≤ x < x_(i+1), the last piece for its end.
 * @param xs rising, two or more @param x inside them, same unit @returns place, a count from 0
 * @throws OutOfRangeError (a RangeError) when x lies outside
 * Range: inside the points. Source: binary search.
 * @example pieceAt([0, 1, 2, 4], 2.5) // 2
 */
export function pieceAt(xs: readonly number[], x: number): number {
  const last = xs.length - 1;
  if (!(x >= (xs[0] ?? Number.NaN) && x <= (xs[last] ?? Number.NaN)))
    throw new OutOfRangeError('curve', 'Outside the points of the curve.');
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if ((xs[middle] ?? 0) <= x) low = middle;
    else high = middle;
  }
  return low;
}

/** Weights of y0, slope0, y1, slope1 in the value of a cubic piece: 2s³ − 3s² + 1, h(s³ − 2s² + s), 3s² − 2s³, h(s³ − s²).
 * @param s share of the piece, 0..1 @param h width of the piece, unit of x
 * @returns four weights, the second and fourth in the unit of x @throws never
 * Range: s 0..1. Source: cubic Hermite basis, e.g. Fritsch and Carlson (1980) equation 2.
 * @example hermiteShapes(0.5, 2)[1] // 0.25
 */
export function hermiteShapes(s: number, h: number): [number, number, number, number] {
  const s2 = s * s;
  const s3 = s2 * s;
  return [2 * s3 - 3 * s2 + 1, h * (s3 - 2 * s2 + s), 3 * s2 - 2 * s3, h * (s3 - s2)];
}

/** Exact integrals of hermiteShapes over x from the start of the piece to the share s.
 * @param s share of the piece, 0..1 @param h width of the piece, unit of x
 * @returns four weights, in the unit of x, the second and fourth in its square @throws never
 * Range: s 0..1. Source: integrated term by term.
 * @example hermiteIntegrals(1, 2)[0] // 1
 */
export function hermiteIntegrals(s: number, h: number): [number, number, number, number] {
  const s2 = s * s;
  const s3 = s2 * s;
  const s4 = s3 * s;
  return [
    h * (s4 / 2 - s3 + s),
    h * h * (s4 / 4 - (2 * s3) / 3 + s2 / 2),
    h * (s3 - s4 / 2),
    h * h * (s4 / 4 - s3 / 3),
  ];
}

/** Value of a curve: Σ of hermiteShapes times values and slopes of the piece's ends.
 * @param curve from pchip @param x inside its points, unit of x
 * @returns y, in the unit of the values @throws OutOfRangeError (a RangeError) when x lies outside: a curve is not drawn on past its points
 * Range: inside the points. Source: as pchipSlopes.
 * @example pchipValue(pchip([0, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6], [0, 32, 64, 125, 178, 215, 237, 246]), 0.15) // 95.2389647
 */
export function pchipValue(curve: Pchip, x: number): number {
  const { xs, ys, slopes } = curve;
  const i = pieceAt(xs, x);
  const x0 = xs[i] ?? 0;
  const h = (xs[i + 1] ?? 0) - x0;
  const [a, b, c, d] = hermiteShapes((x - x0) / h, h);
  return a * (ys[i] ?? 0) + b * (slopes[i] ?? 0) + c * (ys[i + 1] ?? 0) + d * (slopes[i + 1] ?? 0);
}

/** Slope of a curve: dy/dx = (6s² − 6s)(y0 − y1)/h + (3s² − 4s + 1)slope0 + (3s² − 2s)slope1.
 * @param curve from pchip @param x inside its points, unit of x
 * @returns unit of y per unit of x @throws OutOfRangeError (a RangeError) when x lies outside
 * Range: inside the points. Source: pchipValue, differentiated.
 * @example pchipSlope(pchip([0, 1, 2], [0, 1, 4]), 1) // 1.5
 */
export function pchipSlope(curve: Pchip, x: number): number {
  const { xs, ys, slopes } = curve;
  const i = pieceAt(xs, x);
  const x0 = xs[i] ?? 0;
  const h = (xs[i + 1] ?? 0) - x0;
  const s = (x - x0) / h;
  const rise = ((ys[i + 1] ?? 0) - (ys[i] ?? 0)) / h;
  return (
    6 * s * (1 - s) * rise +
    (3 * s * s - 4 * s + 1) * (slopes[i] ?? 0) +
    (3 * s * s - 2 * s) * (slopes[i + 1] ?? 0)
  );
}

/** Exact integral of a curve from one x to another: Σ of hermiteIntegrals over the pieces between.
 * @param curve from pchip @param from inside its points, unit of x @param to inside its points, either side of `from`
 * @returns unit of y times unit of x, negative when `to` lies below `from` @throws OutOfRangeError (a RangeError) when an end lies outside
 * Range: inside the points. Source: pchipValue, integrated.
 * @example pchipIntegral(pchip([0, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6], [0, 32, 64, 125, 178, 215, 237, 246]), 0, 0.6) // 94.70394385
 */
export function pchipIntegral(curve: Pchip, from: number, to: number): number {
  if (to < from) return -pchipIntegral(curve, to, from);
  const { xs, ys, slopes } = curve;
  const last = pieceAt(xs, to);
  let sum = 0;
  for (let i = pieceAt(xs, from); i <= last; i++) {
    const x0 = xs[i] ?? 0;
    const h = (xs[i + 1] ?? 0) - x0;
    const ends = [ys[i] ?? 0, slopes[i] ?? 0, ys[i + 1] ?? 0, slopes[i + 1] ?? 0];
    const upTo = hermiteIntegrals(Math.min(1, (to - x0) / h), h);
    const before = hermiteIntegrals(Math.max(0, (from - x0) / h), h);
    ends.forEach((end, k) => (sum += end * ((upTo[k] ?? 0) - (before[k] ?? 0))));
  }
  return sum;
}
