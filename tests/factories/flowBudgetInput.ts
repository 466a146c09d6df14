import { type FlowBudgetInput } from '@/shared/flow/uncertainty/flowBudget';

/** Uncertainty of a plausible mid-lift reading: vane, 26 inH2O brought to 28, comparative line. */
export function flowBudgetInput(over: Partial<FlowBudgetInput> = {}): FlowBudgetInput {
  return {
    flowM3PerS: 0.08,
    leakM3PerS: 0.0012,
    leakUncertaintyM3PerS: 0.0002,
    indicated: 166,
    indicatedStep: 1,
    indicatedM3PerS: 0.0783,
    testDropPa: 6476.3,
    standardDropPa: 6974.48948,
    pressureStepPa: 24.9,
    gaugeZeroPa: 20,
    gaugeSpanRatio: 0.005,
    repeat: { ratio: 0.004, degreesOfFreedom: 12 },
    setUp: { ratio: 0.008, degreesOfFreedom: 9 },
    slopeM3PerSPerM: 9,
    liftM: 0.00762,
    liftStepM: 0.0000254,
    liftZeroM: 0.00003,
    densityKgPerM3: 1.16,
    airRatio: 0.004,
    airExponent: 0.5,
    calibration: { grade: 'comparative', referenceRatio: 0.025, degreesOfFreedom: 20 },
    ...over,
  };
}
