import { OutOfRangeError, finite, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** How indicated flow becomes true flow: a factor, a straight line, or a factor interpolated by indicated flow. */
export type CalibrationModel =
  | { kind: 'factor'; factorRatio: number }
  | { kind: 'line'; slopeRatio: number; offsetM3PerS: number }
  | { kind: 'table'; points: readonly { indicatedM3PerS: number; factorRatio: number }[] };

/** Indicated flows between which it was fitted; null when that was not kept. */
export type CalibratedRange = { lowM3PerS: number; highM3PerS: number } | null;

export type Calibrated = {
  flowM3PerS: number;
  /** below or above the calibrated range, where it is clamped */
  outside: 'below' | 'above' | null;
};

function interpolated(
  points: readonly { indicatedM3PerS: number; factorRatio: number }[],
  at: number,
): number {
  const [first, ...rest] = [...points].sort((a, b) => a.indicatedM3PerS - b.indicatedM3PerS);
  if (!first) throw new OutOfRangeError('calibration', 'The calibration has no points.');
  let low = first;
  if (at <= low.indicatedM3PerS) return low.factorRatio;
  for (const high of rest) {
    if (at <= high.indicatedM3PerS) {
      const share = (at - low.indicatedM3PerS) / (high.indicatedM3PerS - low.indicatedM3PerS);
      return low.factorRatio + share * (high.factorRatio - low.factorRatio);
    }
    low = high;
  }
  return low.factorRatio;
}

function factorAt(model: CalibrationModel, indicated: number): number {
  switch (model.kind) {
    case 'factor':
      return model.factorRatio;
    case 'table':
      return interpolated(model.points, indicated);
    case 'line':
      return model.slopeRatio + model.offsetM3PerS / positive(indicated, 'indicated flow');
  }
}

/** Calibrated flow: Q = f(ind)·ind with f the factor, the line's slope + offset/ind, or the factor interpolated by indicated
 * flow. Beyond the ends of its range the factor is the one at the end (clamped), and the result is flagged.
 * @param model factor (dimensionless), line (slope dimensionless, offset m³/s) or points (m³/s, dimensionless)
 * @param range indicated flows it was fitted between, m³/s, or null @param indicatedM3PerS indicated flow, m³/s
 * @returns flow m³/s, and on which side it lies outside the range, if it does
 * @throws OutOfRangeError (a RangeError) for a flow below 0, a range that is none, or a factor not above 0
 * Range: inside the calibrated range; outside its uncertainty grows. Source: flow-maths, section 1, step 3.
 * @example calibrated({ kind: 'factor', factorRatio: 0.985 }, { lowM3PerS: 0.01, highM3PerS: 0.1 }, 0.2) // { flowM3PerS: 0.1970, outside: 'above' }
 */
export function calibrated(
  model: CalibrationModel,
  range: CalibratedRange,
  indicatedM3PerS: number,
): Calibrated {
  const indicated = zeroOrMore(indicatedM3PerS, 'indicated flow');
  if (
    range &&
    !(positive(range.lowM3PerS, 'low end of the calibration') < finite(range.highM3PerS, 'high end'))
  )
    throw new OutOfRangeError('calibration', 'The calibration’s low end must lie below its high end.');
  const outside =
    range && indicated < range.lowM3PerS ? 'below' : range && indicated > range.highM3PerS ? 'above' : null;
  if (indicated === 0) return { flowM3PerS: 0, outside };
  const within = range ? Math.min(Math.max(indicated, range.lowM3PerS), range.highM3PerS) : indicated;
  return { flowM3PerS: indicated * positive(factorAt(model, within), 'factor of the calibration'), outside };
}
