import { between, positive } from '@/shared/units/outOfRange';

/** Where the barometer figure comes from: the shop's own gauge, a weather report (reduced to sea level), or no figure at
 * all, only the altitude. */
export type BarometerSource =
  | { from: 'ownGauge'; pressureAbsPa: number }
  | { from: 'weatherReport'; seaLevelPa: number; altitudeM: number }
  | { from: 'altitude'; altitudeM: number };

export type Barometer = {
  pressureAbsPa: number;
  /** true when nothing was measured: the weather alone moves it by 3 % */
  isEstimate: boolean;
  sentence: string;
};

const seaLevelPa = 101325;
const seaLevelK = 288.15;
const lapseKPerM = 0.0065;
/** g M / (R L), dimensionless */
const exponent = (9.80665 * 0.0289644) / (8.31432 * lapseKPerM);

/** Pressure of the standard atmosphere at an altitude: p = p_sea · (1 − L h / T_sea)^(g M/(R L)).
 * @param altitudeM altitude above sea level, m
 * @returns Pa @throws OutOfRangeError (a RangeError) outside −500 to 6000 m
 * Range: −500 to 6000 m. Source: US Standard Atmosphere 1976, eq. 33a (ISO 2533).
 * @example standardPressureAtPa(1000) // 89874.57
 */
export function standardPressureAtPa(altitudeM: number): number {
  const h = between(altitudeM, -500, 6000, 'altitude in m');
  return seaLevelPa * (1 - (lapseKPerM * h) / seaLevelK) ** exponent;
}

/** Pressure on the spot from one reduced to sea level, as weather reports give it:
 * p = (q^(1/n) − p_sea^(1/n) · L h / T_sea)^n with n = g M/(R L), the altimeter relation.
 * @param report.seaLevelPa pressure reduced to sea level, Pa @param report.altitudeM altitude of the shop, m
 * @returns Pa @throws OutOfRangeError (a RangeError) outside 85 to 110 kPa or −500 to 6000 m
 * Range: −500 to 6000 m; exact for altimeter settings, within 0.3 % for reports reduced with the day's temperature.
 * Source: WMO-No. 8 (2014), part I, chapter 3; US Standard Atmosphere 1976.
 * @example stationPressurePa({ seaLevelPa: 101325, altitudeM: 300 }) // 97772.58
 */
export function stationPressurePa(report: { seaLevelPa: number; altitudeM: number }): number {
  const q = between(report.seaLevelPa, 85e3, 110e3, 'pressure reduced to sea level, in Pa');
  const h = between(report.altitudeM, -500, 6000, 'altitude in m');
  return (q ** (1 / exponent) - (seaLevelPa ** (1 / exponent) * lapseKPerM * h) / seaLevelK) ** exponent;
}

/** Absolute pressure of the room from what the shop has: gauge as it stands, report by `stationPressurePa`, altitude by
 * `standardPressureAtPa`. Formula: as in those two.
 * @param source.from where it comes from @param source.pressureAbsPa own gauge, Pa
 * @param source.seaLevelPa report, Pa @param source.altitudeM altitude, m
 * @returns pressure in Pa, whether it is an estimate, and a sentence for the working
 * @throws OutOfRangeError (a RangeError) for a gauge not above 0 or figures outside the ranges of those two
 * Range: −500 to 6000 m. Source: as those two.
 * @example barometer({ from: 'ownGauge', pressureAbsPa: 99400 }) // { pressureAbsPa: 99400, isEstimate: false }
 */
export function barometer(source: BarometerSource): Barometer {
  switch (source.from) {
    case 'ownGauge':
      return {
        pressureAbsPa: positive(source.pressureAbsPa, 'barometer'),
        isEstimate: false,
        sentence: 'Barometer read on the shop’s own gauge, taken as it stands.',
      };
    case 'weatherReport':
      return {
        pressureAbsPa: stationPressurePa(source),
        isEstimate: false,
        sentence: `Weather reports are reduced to sea level; brought back to ${source.altitudeM.toFixed(0)} m.`,
      };
    case 'altitude':
      return {
        pressureAbsPa: standardPressureAtPa(source.altitudeM),
        isEstimate: true,
        sentence: `No barometer: the standard pressure at ${source.altitudeM.toFixed(0)} m. The weather moves it by 3 %.`,
      };
  }
}
