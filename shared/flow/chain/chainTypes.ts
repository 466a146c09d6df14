import type { z } from 'zod';
import type { AirState } from '@/shared/flow/air/moistAir';
import type { CalibratedRange, CalibrationModel } from '@/shared/flow/element/calibrate';
import type { PlenumAir } from '@/shared/flow/element/inletState';
import type { UnscaledFlow } from '@/shared/flow/ideal/coefficients';
import type { DuctPlate } from '@/shared/flow/orifice/dischargeCoefficient';
import type { WallPlate } from '@/shared/flow/orifice/orificeFlow';
import type { DecimalMark, Direction, FlowUnit, PressureUnit } from '@/shared/schema/primitives';
import type { Calibration, CalibrationGrade, ElementPlace, FlowElement } from '@/shared/schema/records';

/* The chain from a reading to a corrected flow. The order is fixed: zero, scale, calibration, element, leak, test pressure,
 * air. Each step is a pure function that returns value, unit and a sentence; `working` runs them and says what was
 * skipped and why. Inside, everything is SI; the sentences are in the shop's units. */

export type StepName =
  'reading' | 'zero' | 'pressureZero' | 'scale' | 'calibration' | 'element' | 'leak' | 'testPressure' | 'air';

/** `notes` are what the sheet must say as well: outside a range, assumed, not known. */
export type ChainStep = {
  name: StepName;
  state: 'done' | 'skipped' | 'stopped';
  value: number;
  unit: 'm3/s' | 'Pa' | 'share';
  formula: string;
  sentence: string;
  notes: string[];
};

/** What an instrument shows, in its own quantity: a flow, a share of full scale, or a pressure drop over a plate. */
export type Shown = { unit: ChainStep['unit']; value: number };

/** Flow as keyed: in a unit of flow, in percent of full scale, or as the drop over a plate. */
export type KeyedFlow = { text: string; unit: FlowUnit | PressureUnit | '%' };
export type KeyedPressure = { text: string; unit: PressureUnit };

export type ChainReading = { flow: KeyedFlow; pressure: KeyedPressure };

export type ChainBench = {
  element: z.infer<typeof FlowElement>;
  place: z.infer<typeof ElementPlace>;
  /** density a hot wire, pitot tube or orifice is scaled for, kg/m³; null when the bench does not say */
  scaledDensityKgPerM3: number | null;
  plate: DuctPlate | WallPlate | null;
  /** 0.5 for holes, to 1 for porous leaks */
  leakExponent: number;
  /** false when the leak lies where the element does not see it: it is then not subtracted */
  isLeakBeforeElement: boolean;
};

export type ChainContext = {
  bench: ChainBench;
  direction: Direction;
  range: { fullScaleM3PerS: number; law: 'linear' | 'root' } | null;
  /** at rest; text as keyed, may be below zero */
  zero: { flow: KeyedFlow | null; pressure: KeyedPressure | null } | null;
  calibration: {
    model: CalibrationModel;
    range: CalibratedRange;
    grade: CalibrationGrade;
    /** steps that were on when it was fitted */
    stepsOn: Calibration['stepsOn'];
  } | null;
  /** `settingRatio` is reading now over reading then for equal flow, 1 when the setting did not change */
  leak: { reading: ChainReading; settingRatio: number } | null;
  room: AirState | null;
  plenum: PlenumAir | null;
  standardPressure: KeyedPressure;
  reference: { label: string; densityKgPerM3: number; air: AirState };
  show: { flowUnit: FlowUnit; pressureUnit: PressureUnit; decimalMark: DecimalMark };
};

export type Working = {
  steps: ChainStep[];
  /** flow at the standard test pressure and reference air, m³/s; null when a step stopped the chain */
  flowM3PerS: number | null;
  /** the flow as it was, at the inlet state and its own test pressure: what discharge coefficients are taken from */
  unscaled: UnscaledFlow | null;
  /** true when no air was recorded and the reference air stood in for it */
  isAirAssumed: boolean;
  /** every note of every step */
  notes: string[];
};
