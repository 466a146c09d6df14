import { positive } from '@/shared/units/outOfRange';

/** Gas constant of dry air, J/(kg K). Source: US Standard Atmosphere 1976, 8314.32 / 28.9644. */
export const gasConstantJPerKgK = 8314.32 / 28.9644;

/** Ratio of the specific heats of air, dimensionless. */
export const heatRatio = 1.4;

/** Density of dry air as an ideal gas: ρ = p / (R T). Kept for comparison; the product's densities are CIPM-2007.
 * @param state.pressureAbsPa absolute static pressure, Pa @param state.temperatureK static temperature, K
 * @returns kg/m³ @throws OutOfRangeError (a RangeError) unless both are finite and above 0
 * Range: 50 to 110 kPa, 250 to 330 K. Humidity ignored: 1.6 % high at 303 K saturated.
 * Source: US Standard Atmosphere 1976, R = 287.05307 J/(kg K).
 * @example dryAirDensityKgPerM3({ pressureAbsPa: 101325, temperatureK: 288.15 }) // 1.224999
 */
export function dryAirDensityKgPerM3(state: { pressureAbsPa: number; temperatureK: number }): number {
  const pressureAbsPa = positive(state.pressureAbsPa, 'absolute pressure');
  return pressureAbsPa / (gasConstantJPerKgK * positive(state.temperatureK, 'temperature in kelvin'));
}

/** Dynamic viscosity of air, Sutherland: μ = β T^1.5 / (T + S), β = 1.458e-6 kg/(s m K^½), S = 110.4 K.
 * @param temperatureK temperature, K
 * @returns Pa s @throws OutOfRangeError (a RangeError) unless finite and above 0
 * Range: 100 to 800 K; humidity changes it by less than 1 % in a shop. Source: US Standard Atmosphere 1976, eq. 51.
 * @example viscosityPaS(288.15) // 1.789380e-5
 */
export function viscosityPaS(temperatureK: number): number {
  const t = positive(temperatureK, 'temperature in kelvin');
  return (1.458e-6 * t ** 1.5) / (t + 110.4);
}

/** Speed of sound in dry air: a = √(γ R T).
 * @param temperatureK static temperature, K
 * @returns m/s @throws OutOfRangeError (a RangeError) unless finite and above 0
 * Range: 200 to 400 K; humid air is up to 0.5 % faster. Source: US Standard Atmosphere 1976, eq. 50.
 * @example soundSpeedMPerS(293.15) // 343.2338
 */
export function soundSpeedMPerS(temperatureK: number): number {
  return Math.sqrt(heatRatio * gasConstantJPerKgK * positive(temperatureK, 'temperature in kelvin'));
}
