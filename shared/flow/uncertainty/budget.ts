/**
 * A budget of uncertainty. Purpose: say where the ± of a flow, a figure or a difference comes from, so that parts which
 * two results share can be left out of their difference. Each part is one independent error with a **signed**
 * contribution (sensitivity times standard uncertainty) and says what shares that one error: nothing but this `reading`,
 * every reading of the `run`, of the `bench` (its gauge and instruments), or of the `calibration`.
 * Invariants: parts are independent of each other; contributions of one shared error add with their signs, contributions
 * of different errors add by their squares.
 */
import { effectiveFreedom, expandedUncertainty, rootSumSquares } from '@/shared/flow/uncertainty/propagation';
import { finite } from '@/shared/units/outOfRange';

/** What shares one error: this reading alone, or every reading of the run, the bench, the calibration. */
export type SharedBy = 'reading' | 'run' | 'bench' | 'calibration';

/** Names of the parts, with the words a screen shows. */
export const partWords = {
  flowResolution: 'step and swing of the flow reading',
  pressureResolution: 'step of the pressure reading',
  gaugeZero: 'zero of the pressure gauge',
  gaugeSpan: 'span of the pressure gauge',
  repeat: 'repeat, same set-up',
  setUp: 'set-up: head off and back on',
  liftResolution: 'step of the lift',
  liftZero: 'lift zero',
  leak: 'leak',
  air: 'air',
  rootBias: 'root to the standard pressure',
  calibration: 'calibration: the reference',
  calibrationLevel: 'calibration: level of the line',
  calibrationSlope: 'calibration: slope of the line',
  outsideCalibration: 'outside the calibrated range',
} as const;

export type PartName = keyof typeof partWords;

/** What one independent error does to a flow. */
export type Contribution = {
  name: PartName;
  sharedBy: SharedBy;
  degreesOfFreedom: number;
  /** sensitivity times standard uncertainty, signed, m³/s */
  contributionM3PerS: number;
};

/** A contribution with where it comes from: the input's value and standard uncertainty in `unit`, its sensitivity. */
export type BudgetPart = Contribution & {
  value: number;
  unit: string;
  standardUncertainty: number;
  /** m³/s per unit */
  sensitivity: number;
};

export type Budget<Part extends Contribution = Contribution> = {
  flowM3PerS: number;
  parts: Part[];
  standardUncertaintyM3PerS: number;
  degreesOfFreedom: number;
  coverageFactor: number;
  /** half width of the 95 % interval, m³/s */
  expandedM3PerS: number;
  /** false when the bench has no calibration: the ± then holds for differences on this bench, not for the flow itself */
  isAbsoluteKnown: boolean;
  /** sentences to show beside the ± */
  cautions: string[];
};

/** Combines independent parts: u² = Σ contribution², ν by Welch-Satterthwaite, U at 95 % by Student's t.
 * @param flowM3PerS the result, m³/s @param parts independent contributions, m³/s
 * @param notes `isAbsoluteKnown`, true by default, and `cautions`
 * @returns the budget, its uncertainties in m³/s @throws OutOfRangeError (a RangeError) for numbers that are not finite
 * Range: as the law of propagation. Source: GUM 5.1.2, G.4.1.
 * @example budgetOf(0.1, [{ name: 'repeat', sharedBy: 'reading', degreesOfFreedom: 10, contributionM3PerS: 0.001 }]).expandedM3PerS // 0.002228139
 */
export function budgetOf<Part extends Contribution>(
  flowM3PerS: number,
  parts: readonly Part[],
  notes: { isAbsoluteKnown?: boolean; cautions?: readonly string[] } = {},
): Budget<Part> {
  finite(flowM3PerS, 'flow');
  const standardUncertaintyM3PerS = rootSumSquares(parts.map(({ contributionM3PerS }) => contributionM3PerS));
  const degreesOfFreedom = effectiveFreedom(
    parts.map((part) => ({
      contribution: part.contributionM3PerS,
      degreesOfFreedom: part.degreesOfFreedom,
    })),
  );
  const { coverageFactor, expandedUncertainty: expandedM3PerS } = expandedUncertainty(
    standardUncertaintyM3PerS,
    degreesOfFreedom,
  );
  return {
    flowM3PerS,
    parts: [...parts],
    standardUncertaintyM3PerS,
    degreesOfFreedom,
    coverageFactor,
    expandedM3PerS,
    isAbsoluteKnown: notes.isAbsoluteKnown ?? true,
    cautions: [...(notes.cautions ?? [])],
  };
}
