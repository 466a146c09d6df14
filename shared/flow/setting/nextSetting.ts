import { OutOfRangeError, finite, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** The reading is proportional to an area setting, and to the square of a diameter setting. */
export type SettingKind = 'area' | 'diameter';

/** A pull on a reference: the setting it was made with, what the bench showed and what the reference passes. The three
 * settings share one unit (m² or m), the two flows another (m³/s). */
export type SettingPull = {
  kind: SettingKind;
  setting: number;
  measuredM3PerS: number;
  targetM3PerS: number;
  /** smallest step of the instrument, in the unit of the setting */
  settingStep: number;
};

/** A setting that can be keyed, and what it would leave. */
export type SettingChoice = {
  setting: number;
  /** what the bench would read too much (+) or too little (−), as a share of the target */
  errorRatio: number;
  /** factor that takes the rest: true over indicated */
  factorRatio: number;
};

export type NextSetting = {
  /** unrounded */
  exactSetting: number;
  nearest: SettingChoice;
  /** the step on the other side of the exact one */
  neighbour: SettingChoice;
  /** true when the neighbour leaves the smaller error (a diameter acts by its square) */
  isNeighbourBetter: boolean;
};

function choiceAt(pull: SettingPull, setting: number): SettingChoice {
  const share = setting / pull.setting;
  const wouldRead = pull.measuredM3PerS * (pull.kind === 'area' ? share : share * share);
  return {
    setting,
    errorRatio: wouldRead / pull.targetM3PerS - 1,
    factorRatio: pull.targetM3PerS / wouldRead,
  };
}

/** Next setting of an anemometer after a pull on a reference: next = setting · target/measured for an area,
 * next = setting · √(target/measured) for a diameter; then the steps of the instrument on both sides of it.
 * During the search the factor is 1. At one flow the line through zero hides a velocity offset: ask for a second flow.
 * @param pull.kind area or diameter @param pull.setting setting of the pull, m² or m
 * @param pull.measuredM3PerS indicated flow, m³/s
 * @param pull.targetM3PerS the reference's flow at today's pressure and air, m³/s (see `referenceFlowTodayM3PerS`)
 * @param pull.settingStep smallest step of the setting, m² or m
 * @returns the exact setting, the nearest step and its neighbour (m² or m) with the error each leaves and the factor for it
 * @throws OutOfRangeError (a RangeError) unless all are above 0 and the step fits below the exact setting
 * Range: measured within a third to three times the target, else something else is wrong; not enforced.
 * Source: the reading is profile factor · area · point velocity, ISO 3966.
 * @example nextSetting({ kind: 'area', setting: 12.566, measuredM3PerS: 0.2362, targetM3PerS: 0.2415, settingStep: 0.001 }) // { exactSetting: 12.847964, nearest: { setting: 12.848 } }
 */
export function nextSetting(pull: SettingPull): NextSetting {
  const setting = positive(pull.setting, 'setting');
  const step = positive(pull.settingStep, 'step of the setting');
  const share = positive(pull.targetM3PerS, 'target flow') / positive(pull.measuredM3PerS, 'measured flow');
  const exactSetting = setting * (pull.kind === 'area' ? share : Math.sqrt(share));
  const steps = Math.round(exactSetting / step);
  if (!(exactSetting > step) || !Number.isSafeInteger(steps))
    throw new OutOfRangeError('step of the setting', 'The step is too coarse for this setting.');
  const otherSteps = exactSetting / step >= steps ? steps + 1 : steps - 1;
  const nearest = choiceAt(pull, steps * step);
  const neighbour = choiceAt(pull, Math.max(otherSteps, 1) * step);
  return {
    exactSetting,
    nearest,
    neighbour,
    isNeighbourBetter: Math.abs(neighbour.errorRatio) < Math.abs(nearest.errorRatio),
  };
}

/** Share of the flow that half a step of the setting moves: step/(2·setting) for an area, step/setting for a diameter.
 * @param kind area or diameter @param setting setting, m² or m @param settingStep smallest step, same unit
 * @returns 0..1 @throws OutOfRangeError (a RangeError) unless setting and step are above 0
 * Range: steps small against the setting. Source: the derivative of the proportion.
 * @example halfStepRatio('area', 12.8, 0.1) // 0.00391
 */
export function halfStepRatio(kind: SettingKind, setting: number, settingStep: number): number {
  const half = positive(settingStep, 'step of the setting') / (2 * positive(setting, 'setting'));
  return kind === 'area' ? half : 2 * half;
}

/** Whether the search may stop: |error| ≤ max(tolerance, half a step, 2·noise/√pulls).
 * @param search.errorRatio error of the pulls at this setting, share of the target
 * @param search.toleranceRatio what the shop asks for, share @param search.halfStepRatio half a step of the setting, share
 * @param search.noiseRatio standard deviation of one pull, share @param search.pullCount pulls at this setting, 1 or more
 * @returns true to stop, with the limit it was judged by (share) @throws OutOfRangeError (a RangeError) for figures below 0
 * Range: one pull on. Source: flow-maths, section 6; two standard deviations of the mean.
 * @example isSettled({ errorRatio: -0.004, toleranceRatio: 0.003, halfStepRatio: 0.0039, noiseRatio: 0.005, pullCount: 4 }) // { isSettled: true, limitRatio: 0.00500 }
 */
export function isSettled(search: {
  errorRatio: number;
  toleranceRatio: number;
  halfStepRatio: number;
  noiseRatio: number;
  pullCount: number;
}): { isSettled: boolean; limitRatio: number } {
  const pulls = positive(search.pullCount, 'number of pulls');
  const limitRatio = Math.max(
    zeroOrMore(search.toleranceRatio, 'tolerance'),
    zeroOrMore(search.halfStepRatio, 'half step'),
    (2 * zeroOrMore(search.noiseRatio, 'noise')) / Math.sqrt(pulls),
  );
  return { isSettled: Math.abs(finite(search.errorRatio, 'error')) <= limitRatio, limitRatio };
}

/** Velocity offset that two pulls at one setting, on references of different flow, show: the straight line through both,
 * indicated = slope·true + offset. A vane that starts late has an offset below 0, which one flow cannot show.
 * @param low.indicatedM3PerS indicated flow, m³/s @param low.trueM3PerS flow of the reference, m³/s
 * @param high.indicatedM3PerS the same at the larger flow, m³/s @param high.trueM3PerS m³/s
 * @returns slope (dimensionless) and offset (m³/s of indicated flow)
 * @throws OutOfRangeError (a RangeError) unless flows are above 0 and the second reference's is at least a tenth larger
 * Range: references a tenth apart or more; two or three times is better. Source: a line through two points.
 * @example offsetFromTwoFlows({ indicatedM3PerS: 0.018, trueM3PerS: 0.02 }, { indicatedM3PerS: 0.198, trueM3PerS: 0.2 }) // { slopeRatio: 1.000, offsetM3PerS: -0.002000 }
 */
export function offsetFromTwoFlows(
  low: { indicatedM3PerS: number; trueM3PerS: number },
  high: { indicatedM3PerS: number; trueM3PerS: number },
): { slopeRatio: number; offsetM3PerS: number } {
  const trueLow = positive(low.trueM3PerS, 'flow of the smaller reference');
  const trueHigh = positive(high.trueM3PerS, 'flow of the larger reference');
  if (!(trueHigh >= 1.1 * trueLow))
    throw new OutOfRangeError('second flow', 'The second reference must flow at least a tenth more.');
  const slopeRatio =
    (positive(high.indicatedM3PerS, 'indicated flow') - positive(low.indicatedM3PerS, 'indicated flow')) /
    (trueHigh - trueLow);
  return { slopeRatio, offsetM3PerS: low.indicatedM3PerS - slopeRatio * trueLow };
}
