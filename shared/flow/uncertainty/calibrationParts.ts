import { type Fit } from '@/shared/flow/statistics/lineFit';
import type { CalibrationGrade } from '@/shared/schema/records';
import { type BudgetPart } from '@/shared/flow/uncertainty/budget';
import { positive, zeroOrMore } from '@/shared/units/outOfRange';

/** What a calibration knows of its own uncertainty. */
export type CalibrationKnown = {
  grade: CalibrationGrade;
  /** standard uncertainty of the reference's flow as a share of it; null when not stated */
  referenceRatio: number | null;
  degreesOfFreedom?: number;
  /** true flow on indicated flow (m³/s both), when a line was fitted */
  fit?: Pick<Fit, 'intercept' | 'slope' | 'centreX' | 'centreSd' | 'slopeSd'>;
  /** indicated flows it was found between, m³/s */
  lowestM3PerS?: number;
  highestM3PerS?: number;
};

/** Smallest standard uncertainty of a shop plate computed from its dimensions, as a share. */
const computedAtLeast = 0.015;
/** Standard uncertainty of a reference head, as a share: castings differ (2.5 to 3 %, from memory). */
const comparativeUsual = 0.0275;
/** How fast a calibration is trusted less outside its ends: share of flow per share of distance. Practice, no source. */
const growthOutside = 0.1;

/** Standard uncertainty of a reference's flow by the grade of the calibration: traceable as certified, computed as stated
 * but 1.5 % at least, comparative as stated or 2.75 %, none unknown.
 * @param grade of the calibration @param statedRatio stated standard uncertainty as a share of the flow, or null
 * @returns share of the flow, or null when it is not known: no calibration, or a certificate without uncertainty
 * @throws OutOfRangeError (a RangeError) for a negative share
 * Range: shares below 0.1. Source: common practice; shop plates and heads from memory.
 * @example referenceUncertaintyRatio('computed', 0.005) // 0.015
 */
export function referenceUncertaintyRatio(
  grade: CalibrationGrade,
  statedRatio: number | null,
): number | null {
  if (statedRatio !== null) zeroOrMore(statedRatio, 'stated uncertainty');
  if (grade === 'none') return null;
  if (grade === 'traceable') return statedRatio;
  return grade === 'computed'
    ? Math.max(computedAtLeast, statedRatio ?? 0)
    : (statedRatio ?? comparativeUsual);
}

/** Parts that a calibration brings to one flow: the reference as a pure factor; of a line its level and its slope about
 * the centre, which are independent; outside the calibrated flows 0.1 of the distance as a share of the nearer end.
 * @param known what the calibration states @param indicatedM3PerS flow it was applied to, m³/s, above 0
 * @param grossM3PerS corrected flow with the leak not yet subtracted, m³/s, 0 or above
 * @returns parts in m³/s, whether the flow itself is known, and cautions
 * @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: factors and lines close to the diagonal. Source: GUM 5.1.2 and H.3.5; growth outside by practice.
 * @example calibrationParts({ grade: 'comparative', referenceRatio: null }, 0.1, 0.1).parts[0].contributionM3PerS // 0.00275
 */
export function calibrationParts(
  known: CalibrationKnown,
  indicatedM3PerS: number,
  grossM3PerS: number,
): { parts: BudgetPart[]; isAbsoluteKnown: boolean; cautions: string[] } {
  positive(indicatedM3PerS, 'indicated flow');
  zeroOrMore(grossM3PerS, 'flow');
  const cautions: string[] = [];
  const ratio = referenceUncertaintyRatio(known.grade, known.referenceRatio);
  const freedom = known.degreesOfFreedom ?? Infinity;
  const part = (
    name: BudgetPart['name'],
    value: number,
    unit: string,
    standardUncertainty: number,
    sensitivity: number,
    degreesOfFreedom = freedom,
  ): BudgetPart => ({
    name,
    sharedBy: 'calibration',
    degreesOfFreedom,
    value,
    unit,
    standardUncertainty,
    sensitivity,
    contributionM3PerS: sensitivity * standardUncertainty,
  });
  const parts = [part('calibration', 1, '1', ratio ?? 0, grossM3PerS)];
  if (ratio === null)
    cautions.push(
      known.grade === 'none'
        ? 'This bench has no calibration: the ± holds for differences on this bench, not for the flow itself.'
        : 'The certificate states no uncertainty: the ± holds for differences on this bench, not for the flow itself.',
    );
  const { fit } = known;
  if (fit) {
    if (fit.centreSd === null || fit.slopeSd === null)
      cautions.push('The line has no point to spare: how far it may be out is not known.');
    // what the steps after the calibration make of one m³/s of it
    const after = grossM3PerS / positive(fit.intercept + fit.slope * indicatedM3PerS, 'calibrated flow');
    parts.push(
      part('calibrationLevel', fit.intercept + fit.slope * fit.centreX, 'm³/s', fit.centreSd ?? 0, after),
      part('calibrationSlope', fit.slope, '1', fit.slopeSd ?? 0, after * (indicatedM3PerS - fit.centreX)),
    );
  }
  const low = known.lowestM3PerS ?? indicatedM3PerS;
  const high = known.highestM3PerS ?? indicatedM3PerS;
  const end = indicatedM3PerS < low ? low : high;
  const distance = Math.max(0, low - indicatedM3PerS, indicatedM3PerS - high);
  if (distance > 0) {
    cautions.push('Outside the calibrated range.');
    const away = distance / positive(end, 'end of the calibrated range');
    parts.push(part('outsideCalibration', away, '1', growthOutside * away, grossM3PerS, Infinity));
  }
  return { parts, isAbsoluteKnown: ratio !== null, cautions };
}
