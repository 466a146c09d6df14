import { positive } from '@/shared/units/outOfRange';

/** Velocity of air without compressibility or loss: V = √(2 Δp / ρ). Pitot tubes are read by it.
 * @param state.pressureDropPa pressure difference, Pa @param state.densityKgPerM3 density, kg/m³
 * @returns m/s @throws OutOfRangeError (a RangeError) unless both are finite and above 0
 * Range: below 10 inH2O within 0.5 % of the isentropic velocity. Source: Bernoulli; ISO 3966 for the pitot tube.
 * @example bernoulliVelocityMPerS({ pressureDropPa: 124.544455, densityKgPerM3: 1.2041054 }) // 14.38285
 */
export function bernoulliVelocityMPerS(state: { pressureDropPa: number; densityKgPerM3: number }): number {
  const drop = positive(state.pressureDropPa, 'pressure difference');
  return Math.sqrt((2 * drop) / positive(state.densityKgPerM3, 'density of the air'));
}
