import { type LiftEvent } from '@/shared/flow/curve/liftEvent';
import {
  type Pchip,
  hermiteIntegrals,
  hermiteShapes,
  pchip,
  pchipSlope,
  pchipSlopes,
  pchipValue,
  pieceAt,
} from '@/shared/flow/curve/pchip';
import { OutOfRangeError, zeroOrMore } from '@/shared/units/outOfRange';

/** Flow against lift of one run, m³/s over m. A closed valve flows nothing: lift 0 is added when it was not tested. */
export type FlowCurve = Pchip & { hasAddedZero: boolean };

/** Curve of a run: PCHIP through its lifts, with (0, 0) added when the lowest lift is above 0.
 * @param readings one or more, in any order: `liftM` in m, 0 or above, each once, and `flowM3PerS` in m³/s
 * @returns the curve, values in m³/s, slopes in m³/s per m
 * @throws OutOfRangeError (a RangeError) for no reading, a negative lift, the same lift twice, or one point at lift 0 alone
 * Range: leak subtracted, so that nothing flows at lift 0. Source: as pchipSlopes.
 * @example flowCurve([{ liftM: 1, flowM3PerS: 2 }]).ys[0] // 0
 */
export function flowCurve(readings: readonly { liftM: number; flowM3PerS: number }[]): FlowCurve {
  const sorted = [...readings].sort((a, b) => a.liftM - b.liftM);
  sorted.forEach(({ liftM }) => zeroOrMore(liftM, 'lift'));
  const lowest = sorted[0];
  if (lowest === undefined) throw new OutOfRangeError('curve', 'A curve needs at least one reading.');
  const hasAddedZero = lowest.liftM > 0;
  const points = hasAddedZero ? [{ liftM: 0, flowM3PerS: 0 }, ...sorted] : sorted;
  const curve = pchip(
    points.map(({ liftM }) => liftM),
    points.map(({ flowM3PerS }) => flowM3PerS),
  );
  return { ...curve, hasAddedZero };
}

export type FlowAtLift = {
  /** null when the lift lies above the highest tested: nothing is drawn on past it */
  flowM3PerS: number | null;
  /** slope of the curve there, m³/s per m; null as above */
  slopeM3PerSPerM: number | null;
  how: 'tested' | 'interpolated' | 'outside';
};

/** Lifts closer than this are the same rung: a tenth of a micrometre, below any gauge and above rounding, m. */
const sameLiftM = 1e-7;

/** Flow at any lift, marked as tested, interpolated, or outside the tested lifts: pchipValue.
 * @param curve of a run @param liftM lift, m, 0 or above
 * @returns flow in m³/s with its mark and slope @throws OutOfRangeError (a RangeError) for a negative lift or one that is not finite
 * Range: 0 to the highest tested lift; above it the answer is flagged, not guessed. Source: as pchipSlopes.
 * @example flowAtLift(flowCurve([{ liftM: 1, flowM3PerS: 2 }, { liftM: 2, flowM3PerS: 4 }]), 1.5).flowM3PerS // 3
 */
export function flowAtLift(curve: FlowCurve, liftM: number): FlowAtLift {
  zeroOrMore(liftM, 'lift');
  const tested = curve.xs.findIndex((x) => Math.abs(x - liftM) <= sameLiftM);
  if (tested >= 0)
    return {
      flowM3PerS: curve.ys[tested] ?? null,
      slopeM3PerSPerM: curve.slopes[tested] ?? null,
      how: tested === 0 && curve.hasAddedZero ? 'interpolated' : 'tested',
    };
  if (liftM > (curve.xs.at(-1) ?? 0)) return { flowM3PerS: null, slopeM3PerSPerM: null, how: 'outside' };
  return {
    flowM3PerS: pchipValue(curve, liftM),
    slopeM3PerSPerM: pchipSlope(curve, liftM),
    how: 'interpolated',
  };
}

/** A mean over a curve as weights of its values and slopes: mean = Σ a_i·y_i + Σ b_i·slope_i. They depend on the lifts
 * alone, so one set serves every run tested at the same lifts.
 */
export type MeanWeights = {
  valueWeights: readonly number[];
  /** in m */
  slopeWeights: readonly number[];
  /** share of the event above the highest tested lift, where the flow is held at its last value; 0..1 */
  heldShare: number;
};

/** Collects the weights of pieces. */
function collector(count: number) {
  const valueWeights = new Array<number>(count).fill(0);
  const slopeWeights = new Array<number>(count).fill(0);
  const add = (piece: number, shapes: readonly [number, number, number, number], by: number) => {
    const put = (list: number[], i: number, weight: number) => (list[i] = (list[i] ?? 0) + by * weight);
    put(valueWeights, piece, shapes[0]);
    put(slopeWeights, piece, shapes[1]);
    put(valueWeights, piece + 1, shapes[2]);
    put(slopeWeights, piece + 1, shapes[3]);
  };
  return { valueWeights, slopeWeights, add };
}

/** Weights of the mean over a lift range: (1/(L2 − L1))·∫Q dL, exact.
 * @param liftsM lifts of the curve (its xs), m @param fromM start, m @param toM end above the start, m
 * @returns the weights @throws OutOfRangeError (a RangeError) when the range is empty or leaves the lifts of the curve
 * Range: inside the tested lifts. Source: pchipIntegral.
 * @example liftRangeWeights([0, 1, 2], 0, 2).valueWeights[1] // 0.5
 */
export function liftRangeWeights(liftsM: readonly number[], fromM: number, toM: number): MeanWeights {
  if (!(toM > fromM)) throw new OutOfRangeError('curve', 'The lift range must end above its start.');
  const highest = liftsM.at(-1) ?? 0;
  // a range keyed in the unit of the lifts may differ from the last one by rounding
  const end = toM > highest && toM - highest <= sameLiftM ? highest : toM;
  const first = pieceAt(liftsM, fromM);
  const last = pieceAt(liftsM, end);
  const { valueWeights, slopeWeights, add } = collector(liftsM.length);
  const length = end - fromM;
  for (let i = first; i <= last; i++) {
    const x0 = liftsM[i] ?? 0;
    const h = (liftsM[i + 1] ?? 0) - x0;
    add(i, hermiteIntegrals(Math.min(1, (end - x0) / h), h), 1 / length);
    add(i, hermiteIntegrals(Math.max(0, (fromM - x0) / h), h), -1 / length);
  }
  return { valueWeights, slopeWeights, heldShare: 0 };
}

/** Nodes and weights of Gauss's rule with ten points on −1..1 (Abramowitz and Stegun table 25.4). */
const gauss = [
  [0.1488743389816312, 0.2955242247147529],
  [0.4333953941292472, 0.2692667193099963],
  [0.6794095682990244, 0.219086362515982],
  [0.8650633666889845, 0.1494513491505806],
  [0.9739065285171717, 0.0666713443086881],
].flatMap(([node = 0, weight = 0]) => [
  { node, weight },
  { node: -node, weight },
]);

/** Share of the event at which the lift passes a level, on a stretch where it only rises or only falls. */
function crossing(event: LiftEvent, from: number, to: number, levelM: number): number {
  const rises = event.liftAt(to) > event.liftAt(from);
  let low = from;
  let high = to;
  for (let i = 0; i < 54; i++) {
    const middle = (low + high) / 2;
    if (event.liftAt(middle) < levelM === rises) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** Weights of the cam-weighted mean: ∫Q(L(θ))dθ/θ over the event, by Gauss's rule between the crossings of tested lifts.
 * @param liftsM lifts of the curve (its xs, the first 0), m @param event from liftEventOfLaw or liftEventOfTable
 * @returns the weights; above the highest tested lift the last flow is held and `heldShare` says for how much of the event
 * @throws OutOfRangeError (a RangeError) unless the lifts begin at 0
 * Range: quadrature to 1e-9. Source: definition; checked by closed forms (half sine and Q ∝ L: 2/π).
 * @example camWeights([0, 1], liftEventOfLaw('halfSine', 1)).heldShare // 0
 */
export function camWeights(liftsM: readonly number[], event: LiftEvent): MeanWeights {
  if (liftsM[0] !== 0) throw new OutOfRangeError('curve', 'A cam-weighted mean needs the curve from lift 0.');
  const last = liftsM.length - 1;
  const highest = liftsM[last] ?? 0;
  const { valueWeights, slopeWeights, add } = collector(liftsM.length);
  const whole = (event.ends.at(-1) ?? 1) - (event.ends[0] ?? 0);
  let heldShare = 0;
  event.ends.slice(1).forEach((to, k) => {
    const from = event.ends[k] ?? 0;
    const ends = [event.liftAt(from), event.liftAt(to)] as const;
    const [low, high] = [Math.min(...ends), Math.max(...ends)];
    const inside = liftsM.filter((liftM) => liftM > low && liftM < high);
    const cuts = [from, ...inside.map((liftM) => crossing(event, from, to, liftM)), to].sort((a, b) => a - b);
    cuts.slice(1).forEach((end, j) => {
      const start = cuts[j] ?? 0;
      const half = (end - start) / 2;
      const middleM = event.liftAt(start + half);
      if (middleM > highest) {
        heldShare += (2 * half) / whole;
        valueWeights[last] = (valueWeights[last] ?? 0) + (2 * half) / whole;
        return;
      }
      const piece = pieceAt(liftsM, Math.max(0, middleM));
      const x0 = liftsM[piece] ?? 0;
      const h = (liftsM[piece + 1] ?? 0) - x0;
      for (const { node, weight } of gauss) {
        const s = (event.liftAt(start + half * (1 + node)) - x0) / h;
        add(piece, hermiteShapes(s, h), (half * weight) / whole);
      }
    });
  });
  return { valueWeights, slopeWeights, heldShare };
}

/** A mean of a curve by its weights: Σ a_i·y_i + Σ b_i·slope_i. It lies between the lowest and the highest flow.
 * @param curve with the lifts the weights were made for @param weights from liftRangeWeights or camWeights
 * @returns m³/s @throws OutOfRangeError (a RangeError) when the numbers of lifts differ
 * Range: as the weights. Source: as the weights.
 * @example meanFlow(flowCurve([{ liftM: 1, flowM3PerS: 1 }]), camWeights([0, 1], liftEventOfLaw('halfSine', 1))) // 0.636619772
 */
export function meanFlow(curve: Pchip, weights: MeanWeights): number {
  if (weights.valueWeights.length !== curve.xs.length)
    throw new OutOfRangeError('curve', 'The weights were made for other lifts.');
  let sum = 0;
  curve.ys.forEach((y, i) => {
    sum += (weights.valueWeights[i] ?? 0) * y + (weights.slopeWeights[i] ?? 0) * (curve.slopes[i] ?? 0);
  });
  return sum;
}

/** Share of a mean that hangs on the slopes near point i, with that point's value moved. A slope hangs on its neighbours
 * only, so a window around the point is enough; the window's own cut ends are not true slopes and are left out. */
function slopeShare(curve: Pchip, weights: MeanWeights, i: number, by: number): number {
  const last = curve.xs.length - 1;
  const from = Math.max(0, i - 3);
  const to = Math.min(last, i + 3);
  const ys = curve.ys.slice(from, to + 1);
  ys[i - from] = (ys[i - from] ?? 0) + by;
  const slopes = pchipSlopes(curve.xs.slice(from, to + 1), ys);
  let sum = 0;
  for (let k = from; k <= to; k++)
    if (k === 0 || k === last || (k > from && k < to))
      sum += (weights.slopeWeights[k] ?? 0) * (slopes[k - from] ?? 0);
  return sum;
}

/** How much a mean moves with each flow of the curve: ∂mean/∂y_i, the slopes' share by central differences of 1e-6.
 * @param curve with the lifts the weights were made for @param weights from liftRangeWeights or camWeights
 * @returns one number a point of the curve (an added zero included), dimensionless; they sum with y_i to the mean
 * @throws OutOfRangeError (a RangeError) when the numbers of lifts differ
 * Range: small changes; at a kink of the slopes the mean of both sides. Source: GUM 5.1.3.
 * @example meanSensitivities(flowCurve([{ liftM: 1, flowM3PerS: 1 }]), liftRangeWeights([0, 1], 0, 1))[1] // 0.5
 */
export function meanSensitivities(curve: Pchip, weights: MeanWeights): number[] {
  meanFlow(curve, weights);
  const step = 1e-6 * Math.max(...curve.ys.map(Math.abs), Number.MIN_VALUE * 1e9);
  return curve.ys.map((_, i) => {
    const moved = slopeShare(curve, weights, i, step) - slopeShare(curve, weights, i, -step);
    return (weights.valueWeights[i] ?? 0) + moved / (2 * step);
  });
}
