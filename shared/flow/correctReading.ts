import type { DecimalMark, Direction, FlowUnit, PressureUnit } from '@/shared/schema/primitives';
import type { SessionSettings } from '@/shared/schema/records';
import {
  flowFromSi,
  flowM3PerS,
  isVolumeFlow,
  pressureInPa,
  readNumber,
  showNumber,
} from '@/shared/units/quantity';

/** One step of the working: what was done, in a sentence, and the flow after it. */
export type WorkingStep = { name: string; sentence: string; flowM3PerS: number };

export type CorrectedReading = {
  /** flow at the standard test pressure, m³/s */
  flowM3PerS: number;
  /** the same in the session's unit, as shown */
  text: string;
  unit: FlowUnit;
  working: WorkingStep[];
};

type Keyed = { flowText: string; flowUnit: FlowUnit; pressureText: string; pressureUnit: PressureUnit };

/** Root correction of a flow to the standard test pressure: Q = Q_test · √(p_standard / p_test).
 * @param flowM3PerSecond flow at the test pressure, m³/s
 * @param testDropPa test pressure, Pa @param standardDropPa standard test pressure, Pa
 * @returns m³/s @throws RangeError unless both pressures are finite and above 0
 * Range: reads high when scaled up (to 28 from 10 inH2O by 1.1 to 2.5 %).
 * Source: common practice of the trade; Bernoulli.
 * @example rootToStandardPressure(1, 2490.8891, 6974.48948) // 1.6733201
 */
export function rootToStandardPressure(
  flowM3PerSecond: number,
  testDropPa: number,
  standardDropPa: number,
): number {
  if (!(
    testDropPa > 0 &&
    standardDropPa > 0 &&
    Number.isFinite(testDropPa) &&
    Number.isFinite(standardDropPa)
  ))
    throw new RangeError('test pressure and standard pressure must be above 0');
  return flowM3PerSecond * Math.sqrt(standardDropPa / testDropPa);
}

/** Brings one reading to the session's standard test pressure through the bench's factor.
 * Steps that need more than the session holds (zero, element, leak, air) are named as not done.
 * @returns the corrected flow with its working, or null when there is nothing to correct by: a pressure of zero, or a
 *   mass flow, which needs the density of the air
 */
export function correctReading(
  reading: Keyed,
  settings: SessionSettings,
  direction: Direction,
): CorrectedReading | null {
  const mark = settings.decimalMark;
  const unit = settings.flowUnit;
  if (!isVolumeFlow(reading.flowUnit) || !isVolumeFlow(unit)) return null;
  const readM3PerS = flowM3PerS(reading.flowText, reading.flowUnit);
  const testDropPa = pressureInPa(reading.pressureText, reading.pressureUnit);
  const standardDropPa = pressureInPa(settings.standardPressureText, settings.standardPressureUnit);
  if (testDropPa === 0 || standardDropPa === 0) return null;
  const show = (valueM3PerS: number) => `${showFlow(flowFromSi(valueM3PerS, unit), mark)} ${unit}`;
  const working: WorkingStep[] = [
    {
      name: 'reading',
      sentence: `Keyed: ${reading.flowText} ${reading.flowUnit} at ${reading.pressureText} ${reading.pressureUnit}.`,
      flowM3PerS: readM3PerS,
    },
  ];
  const calibration = settings[direction];
  let flow = readM3PerS;
  if (calibration) {
    flow *= readNumber(calibration.fit.factorText);
    working.push({
      name: 'calibration',
      sentence: `Times the bench’s factor ${calibration.fit.factorText} (${calibration.grade}): ${show(flow)}.`,
      flowM3PerS: flow,
    });
  } else
    working.push({
      name: 'calibration',
      sentence: `No calibration of this bench for ${direction}: the reading is taken as it stands.`,
      flowM3PerS: flow,
    });
  flow = rootToStandardPressure(flow, testDropPa, standardDropPa);
  working.push({
    name: 'testPressure',
    sentence: `To ${settings.standardPressureText} ${settings.standardPressureUnit} by the square root, × ${showNumber(
      Math.sqrt(standardDropPa / testDropPa),
      4,
      mark,
    )}: ${show(flow)}.`,
    flowM3PerS: flow,
  });
  working.push({
    name: 'notDone',
    sentence: 'Not done: zero, leak and air, because the session holds none of them.',
    flowM3PerS: flow,
  });
  return { flowM3PerS: flow, text: showFlow(flowFromSi(flow, unit), mark), unit, working };
}

/** A flow with one decimal, as the screens show it. */
function showFlow(value: number, mark: DecimalMark): string {
  return showNumber(value, 1, mark);
}
