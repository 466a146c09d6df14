import {
  type Budget,
  type BudgetPart,
  type PartName,
  type SharedBy,
  budgetOf,
} from '@/shared/flow/uncertainty/budget';
import { type CalibrationKnown, calibrationParts } from '@/shared/flow/uncertainty/calibrationParts';
import { resolutionUncertainty } from '@/shared/flow/uncertainty/propagation';
import { rootBias } from '@/shared/flow/uncertainty/rootBias';
import { OutOfRangeError, finite, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** Set-up spread taken until a bench has enough keeper and re-mounted pulls: 0.8 % of the flow. Stated, not measured. */
export const statedSetUpRatio = 0.008;

/** A spread as a share of the flow, with the degrees of freedom behind it (infinity for a stated one). */
export type RelativeSpread = { ratio: number; degreesOfFreedom: number };

/** What the uncertainty of one corrected flow is made of. Every standard uncertainty is 0 or above. */
export type FlowBudgetInput = {
  /** corrected flow, leak subtracted */
  flowM3PerS: number;
  /** the leak that was subtracted from it, and its standard uncertainty */
  leakM3PerS: number;
  leakUncertaintyM3PerS: number;
  /** the flow reading as keyed, any unit, above 0: its step, the swing of the needle from end to end when noted */
  indicated: number;
  indicatedStep: number;
  indicatedSwing?: number;
  /** 1 for an instrument that reads flow or velocity, 0.5 for one that reads a pressure or percent on a root scale */
  indicatedExponent?: number;
  /** the same reading as the flow the calibration was applied to */
  indicatedM3PerS: number;
  testDropPa: number;
  standardDropPa: number;
  inletPressureAbsPa?: number;
  pressureStepPa: number;
  gaugeZeroPa: number;
  /** standard uncertainty of the gauge's span as a share */
  gaugeSpanRatio: number;
  /** pooled by bench and zone, loud lifts apart */
  repeat: RelativeSpread;
  /** pulls averaged into this flow; 1 when left out */
  pullCount?: number;
  /** 0.8 % stated when left out */
  setUp?: RelativeSpread;
  /** slope of the run's curve at this lift */
  slopeM3PerSPerM: number;
  liftM: number;
  liftStepM: number;
  /** standard uncertainty of the lift's zero */
  liftZeroM: number;
  densityKgPerM3: number;
  /** standard uncertainty of the density as a share; large when no air was recorded */
  airRatio: number;
  /** how the flow goes with the density: 0.5 vane, −0.5 hot-wire, 0 an orifice in the same air as the port */
  airExponent: number;
  calibration: CalibrationKnown;
};

/** Budget of one corrected flow. Parts and their contributions: flow step and swing √(a² + w²)/√12·n·Q/ind; pressure step,
 * gauge zero and span, half of their share of p; repeat Q·s/√pulls; set-up Q·s; lift step and lift zero u·dQ/dL; leak;
 * air, exponent·Q·u(ρ)/ρ; bias of the root; calibration. Shared by the reading, the run, the bench or the calibration.
 * @param input see FlowBudgetInput; flows m³/s, pressures Pa, lifts m, shares dimensionless
 * @returns every part with value, standard uncertainty, sensitivity and freedom; u, ν, k and U at 95 % in m³/s; cautions
 * @throws OutOfRangeError (a RangeError) for numbers outside those ranges
 * Range: uncertainties small against their values. Source: GUM 5.1.2; ISO 5725-2 for repeat and set-up; GUM F.2.4.5 for
 * the bias that is left in; the list of parts is this project's.
 * @example flowBudget({ flowM3PerS: 0.1, leakM3PerS: 0, leakUncertaintyM3PerS: 0, indicated: 212, indicatedStep: 0, indicatedM3PerS: 0.1, testDropPa: 6974.48948, standardDropPa: 6974.48948, pressureStepPa: 0, gaugeZeroPa: 0, gaugeSpanRatio: 0, repeat: { ratio: 0.006, degreesOfFreedom: 20 }, slopeM3PerSPerM: 8, liftM: 0.01, liftStepM: 0, liftZeroM: 0, densityKgPerM3: 1.2, airRatio: 0, airExponent: 0.5, calibration: { grade: 'none', referenceRatio: null } }).standardUncertaintyM3PerS // 0.001
 */
export function flowBudget(input: FlowBudgetInput): Budget<BudgetPart> {
  const flow = zeroOrMore(input.flowM3PerS, 'flow');
  const gross = flow + zeroOrMore(input.leakM3PerS, 'leak');
  const testDropPa = positive(input.testDropPa, 'test pressure');
  const pulls = positive(input.pullCount ?? 1, 'number of pulls');
  const setUp = input.setUp ?? { ratio: statedSetUpRatio, degreesOfFreedom: Infinity };
  const density = positive(input.densityKgPerM3, 'density of the air');
  const slope = finite(input.slopeM3PerSPerM, 'slope of the curve');
  const bias = rootBias(testDropPa, input.standardDropPa, input.inletPressureAbsPa);
  const part = (
    name: PartName,
    sharedBy: SharedBy,
    value: number,
    unit: string,
    standardUncertainty: number,
    sensitivity: number,
    degreesOfFreedom = Infinity,
  ): BudgetPart => {
    if (!(degreesOfFreedom > 0)) throw new OutOfRangeError(name, 'Degrees of freedom must be above 0.');
    return {
      name,
      sharedBy,
      degreesOfFreedom,
      value,
      unit,
      standardUncertainty,
      sensitivity,
      contributionM3PerS: sensitivity * standardUncertainty,
    };
  };
  const perIndicated = ((input.indicatedExponent ?? 1) * gross) / positive(input.indicated, 'flow reading');
  const reading = Math.hypot(
    resolutionUncertainty(input.indicatedStep),
    resolutionUncertainty(input.indicatedSwing ?? 0),
  );
  const perPascal = -gross / (2 * testDropPa);
  const calibration = calibrationParts(input.calibration, input.indicatedM3PerS, gross);
  const parts: BudgetPart[] = [
    part('flowResolution', 'reading', input.indicated, 'as keyed', reading, perIndicated),
    part(
      'pressureResolution',
      'reading',
      testDropPa,
      'Pa',
      resolutionUncertainty(input.pressureStepPa),
      perPascal,
    ),
    part('gaugeZero', 'bench', 0, 'Pa', zeroOrMore(input.gaugeZeroPa, 'gauge zero'), perPascal),
    part('gaugeSpan', 'bench', 1, '1', zeroOrMore(input.gaugeSpanRatio, 'gauge span'), -gross / 2),
    part(
      'repeat',
      'reading',
      1,
      '1',
      zeroOrMore(input.repeat.ratio, 'repeat') / Math.sqrt(pulls),
      flow,
      input.repeat.degreesOfFreedom,
    ),
    part('setUp', 'run', 1, '1', zeroOrMore(setUp.ratio, 'set-up'), flow, setUp.degreesOfFreedom),
    part(
      'liftResolution',
      'reading',
      finite(input.liftM, 'lift'),
      'm',
      resolutionUncertainty(input.liftStepM),
      slope,
    ),
    part('liftZero', 'run', 0, 'm', zeroOrMore(input.liftZeroM, 'lift zero'), slope),
    part('leak', 'run', input.leakM3PerS, 'm³/s', zeroOrMore(input.leakUncertaintyM3PerS, 'leak'), -1),
    part(
      'air',
      'bench',
      density,
      'kg/m³',
      zeroOrMore(input.airRatio, 'uncertainty of the air') * density,
      (finite(input.airExponent, 'exponent of the air') * gross) / density,
    ),
    part(
      'rootBias',
      'bench',
      1,
      '1',
      Math.abs(bias.standardUncertaintyRatio),
      Math.sign(bias.nozzleRatio) * gross,
    ),
    ...calibration.parts,
  ];
  return budgetOf(flow, parts, calibration);
}
