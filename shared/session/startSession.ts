import type { Direction, PlannedLift, PressureUnit, Side } from '@/shared/schema/primitives';
import type { Calibration, Run, Rung, SessionSettings, SetUp, ShopSettings } from '@/shared/schema/records';

type StoredCalibration = Calibration & { id: string };

/** The calibration of a bench that holds at an instant, in one direction: adopted, not withdrawn, in date, newest first. */
export function calibrationInForce(
  calibrations: readonly StoredCalibration[],
  benchId: string,
  direction: Direction,
  atIso: string,
): StoredCalibration | null {
  const inForce = calibrations
    .filter((c) => c.benchId === benchId && c.direction === direction && c.withdrawnAt === null)
    .filter((c) => c.fromAt <= atIso && (c.untilAt === null || atIso < c.untilAt))
    .sort((a, b) => b.fromAt.localeCompare(a.fromAt));
  return inForce[0] ?? null;
}

/** What a session copies in when it starts, so that later changes to shop or bench do not move its figures. */
export function sessionSettings(
  shop: ShopSettings,
  standard: { text: string; unit: PressureUnit },
  calibrations: readonly StoredCalibration[],
  benchId: string,
  atIso: string,
): SessionSettings {
  const copied = (direction: Direction) => {
    const found = calibrationInForce(calibrations, benchId, direction, atIso);
    return found ? { calibrationId: found.id, grade: found.grade, fit: found.fit } : null;
  };
  return {
    standardPressureText: standard.text,
    standardPressureUnit: standard.unit,
    flowUnit: shop.flowUnit,
    pressureUnit: shop.pressureUnit,
    liftUnit: shop.liftUnit,
    decimalMark: shop.decimalMark,
    referenceAir: shop.referenceAir,
    showPowerEstimate: false,
    drawing: copied('drawing'),
    blowing: copied('blowing'),
  };
}

/** Nothing noted about what is on the port. */
export const emptySetUp: SetUp = {
  boreAdapter: '',
  inlet: 'notNoted',
  exhaustStub: '',
  plug: '',
  valves: 'notNoted',
  springs: '',
  liftReadAt: '',
};

/** A new run of a port. Intake is drawn and exhaust blown unless the shop does otherwise. */
export function newRun(input: {
  sessionId: string;
  runOrdinal: number;
  side: Side;
  port: string;
  valvesOpenCount: number;
  direction?: Direction;
  setUp?: SetUp;
}): Run {
  return {
    sessionId: input.sessionId,
    runOrdinal: input.runOrdinal,
    side: input.side,
    port: input.port,
    direction: input.direction ?? (input.side === 'intake' ? 'drawing' : 'blowing'),
    pass: 'up',
    setUp: input.setUp ?? emptySetUp,
    valvesOpenCount: input.valvesOpenCount,
    liftZeroBeforeText: null,
    liftZeroBeforeUnit: null,
    liftZeroAfterText: null,
    liftZeroAfterUnit: null,
    airId: null,
    plenumTemperatureText: null,
    plenumTemperatureUnit: null,
  };
}

/** The rungs of a run from the session's lift plan, in the plan's order. */
export function rungsOfPlan(runId: string, plan: readonly PlannedLift[]): Rung[] {
  return plan.map((lift, index) => ({
    runId,
    rungOrdinal: index + 1,
    liftText: lift.text,
    liftUnit: lift.unit,
    isSkipped: false,
  }));
}
