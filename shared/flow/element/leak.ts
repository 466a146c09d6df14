import { between, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** Leak at the test pressure of a reading: Q = Q_leak · (new/old setting) · (p/p_leak)ⁿ.
 * @param leak.flowM3PerS leak as measured and taken through zero, scale, calibration and element, m³/s
 * @param leak.pressureDropPa test pressure it was measured at, Pa
 * @param leak.exponent n of the bench, dimensionless: 0.5 for holes, to 1 for porous leaks
 * @param leak.settingRatio reading now over reading then for equal flow, when the setting changed since; else 1
 * @param pressureDropPa test pressure of the reading, Pa
 * @returns m³/s @throws OutOfRangeError (a RangeError) for a leak below 0, pressures not above 0, or n outside 0.5 to 1
 * Range: pressures within a factor of five of each other. Source: flow-maths, section 1, step 5 (Bernoulli to Darcy).
 * @example leakAtM3PerS({ flowM3PerS: 0.001, pressureDropPa: 7000, exponent: 0.5, settingRatio: 1 }, 1750) // 0.00050
 */
export function leakAtM3PerS(
  leak: { flowM3PerS: number; pressureDropPa: number; exponent: number; settingRatio: number },
  pressureDropPa: number,
): number {
  const n = between(leak.exponent, 0.5, 1, 'exponent of the leak');
  const share =
    positive(pressureDropPa, 'test pressure') / positive(leak.pressureDropPa, 'test pressure of the leak');
  return (
    zeroOrMore(leak.flowM3PerS, 'leak') * positive(leak.settingRatio, 'ratio of the settings') * share ** n
  );
}

/** Judges a leak once, against a mid-lift flow: share = leak/flow, doubtful above 2 %.
 * @param leakM3PerS leak at the test pressure of that flow, m³/s @param midLiftM3PerS flow at mid lift, m³/s
 * @returns share 0 on, and whether it is doubtful @throws OutOfRangeError (a RangeError) for a leak below 0 or no flow
 * Range: 0 on. Source: flow-maths, section 1, step 5; common practice of the trade.
 * @example judgeLeak(0.0012, 0.05) // { leakRatio: 0.0240, isDoubtful: true }
 */
export function judgeLeak(
  leakM3PerS: number,
  midLiftM3PerS: number,
): { leakRatio: number; isDoubtful: boolean } {
  const leakRatio = zeroOrMore(leakM3PerS, 'leak') / positive(midLiftM3PerS, 'flow at mid lift');
  return { leakRatio, isDoubtful: leakRatio > 0.02 };
}
