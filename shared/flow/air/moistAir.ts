import { between, positive } from '@/shared/units/outOfRange';

/** State of air: absolute pressure, temperature, relative humidity 0..1. */
export type AirState = { pressureAbsPa: number; temperatureK: number; humidityRatio: number };

export type MoistAir = {
  densityKgPerM3: number;
  /** saturation vapour pressure over water, Pa */
  saturationPa: number;
  /** enhancement factor, dimensionless */
  enhancementRatio: number;
  /** mole fraction of water vapour, 0..1 */
  vapourRatio: number;
  /** compressibility factor, dimensionless */
  compressibilityRatio: number;
  isInStatedRange: boolean;
  /** what to say in the working when it is outside; empty inside */
  rangeNote: string;
};

const airMolarKgPerMol = 28.96546e-3;
const waterMolarKgPerMol = 18.01528e-3;
const gasConstantJPerMolK = 8.314472;

function compressibility(pressureAbsPa: number, temperatureK: number, vapourRatio: number): number {
  const t = temperatureK - 273.15;
  const x = vapourRatio;
  const pOverT = pressureAbsPa / temperatureK;
  const first =
    1.58123e-6 -
    2.9331e-8 * t +
    1.1043e-10 * t * t +
    (5.707e-6 - 2.051e-8 * t) * x +
    (1.9898e-4 - 2.376e-6 * t) * x * x;
  return 1 - pOverT * first + pOverT * pOverT * (1.83e-11 - 0.765e-8 * x * x);
}

function saturated(
  pressureAbsPa: number,
  temperatureK: number,
): { saturationPa: number; enhancementRatio: number } {
  const t = temperatureK - 273.15;
  const saturationPa = Math.exp(
    1.2378847e-5 * temperatureK ** 2 - 1.9121316e-2 * temperatureK + 33.93711047 - 6343.1645 / temperatureK,
  );
  return { saturationPa, enhancementRatio: 1.00062 + 3.14e-8 * pressureAbsPa + 5.6e-7 * t * t };
}

function checked(state: AirState): AirState {
  between(state.pressureAbsPa, 20e3, 200e3, 'absolute pressure in Pa');
  between(state.temperatureK, 233.15, 373.15, 'temperature in kelvin');
  between(state.humidityRatio, 0, 1, 'relative humidity');
  return state;
}

/** Humid air by CIPM-2007: ρ = p Ma/(Z R T) · [1 − xv (1 − Mv/Ma)], with xv = h f psv / p.
 * @param state.pressureAbsPa absolute pressure, Pa @param state.temperatureK temperature, K
 * @param state.humidityRatio relative humidity, 0..1
 * @returns density kg/m³ and the intermediate figures; flagged, not refused, outside the stated range
 * @throws OutOfRangeError (a RangeError) outside 20 to 200 kPa or −40 to 100 °C, when the humidity is not 0..1, or when
 * there would be more vapour than air
 * Range: stated for 15 to 27 °C and 60 to 110 kPa; a shed leaves it and is told so.
 * Source: Picard, Davis, Gläser, Fujii, Metrologia 45 (2008) 149.
 * @example moistAir({ pressureAbsPa: 101325, temperatureK: 293.15, humidityRatio: 0.5 }) // { densityKgPerM3: 1.1993139 }
 */
export function moistAir(state: AirState): MoistAir {
  const { pressureAbsPa: p, temperatureK, humidityRatio: h } = checked(state);
  const t = temperatureK - 273.15;
  const { saturationPa, enhancementRatio } = saturated(p, temperatureK);
  const vapourRatio = between((h * enhancementRatio * saturationPa) / p, 0, 0.5, 'share of water vapour');
  const z = compressibility(p, temperatureK, vapourRatio);
  const densityKgPerM3 =
    ((p * airMolarKgPerMol) / (z * gasConstantJPerMolK * temperatureK)) *
    (1 - vapourRatio * (1 - waterMolarKgPerMol / airMolarKgPerMol));
  // a hair of slack: 27 °C keyed is 300.15 K, which a computer may miss by its last bit
  const isInStatedRange = t >= 15 - 1e-9 && t <= 27 + 1e-9 && p >= 60e3 && p <= 110e3;
  return {
    densityKgPerM3: positive(densityKgPerM3, 'density of the air'),
    saturationPa,
    enhancementRatio,
    vapourRatio,
    compressibilityRatio: z,
    isInStatedRange,
    rangeNote: isInStatedRange ? '' : 'Outside the equation’s stated range of 15 to 27 °C and 60 to 110 kPa.',
  };
}

/** Density of humid air by CIPM-2007, the one model of every density in the product: ρ = p Ma/(Z R T)·[1 − xv(1 − Mv/Ma)].
 * @param state.pressureAbsPa absolute pressure, Pa @param state.temperatureK temperature, K
 * @param state.humidityRatio relative humidity, 0..1
 * @returns kg/m³ @throws OutOfRangeError (a RangeError) where `moistAir` does
 * Range: stated for 15 to 27 °C and 60 to 110 kPa; `moistAir` flags what lies outside.
 * Source: Picard, Davis, Gläser, Fujii, Metrologia 45 (2008) 149.
 * @example airDensityKgPerM3({ pressureAbsPa: 95000, temperatureK: 300.15, humidityRatio: 0.8 }) // 1.0904534
 */
export function airDensityKgPerM3(state: AirState): number {
  return moistAir(state).densityKgPerM3;
}

/** Relative humidity of room air that was compressed or warmed without gaining water: h = xv p / (f psv), xv as in the room.
 * @param room.pressureAbsPa pressure, Pa @param room.temperatureK temperature, K @param room.humidityRatio humidity, 0..1
 * @param place.pressureAbsPa pressure where the air went, Pa @param place.temperatureK temperature there, K
 * @returns relative humidity there, 0..1 (1 when water would fall out)
 * @throws OutOfRangeError (a RangeError) where `moistAir` does
 * Range: as `moistAir`. Source: Picard et al., Metrologia 45 (2008) 149, the definition of xv.
 * @example carriedHumidityRatio({ pressureAbsPa: 1e5, temperatureK: 293.15, humidityRatio: 0.5 }, { pressureAbsPa: 1e5, temperatureK: 303.15 }) // 0.2753
 */
export function carriedHumidityRatio(
  room: AirState,
  place: { pressureAbsPa: number; temperatureK: number },
): number {
  const here = checked(room);
  checked({ pressureAbsPa: place.pressureAbsPa, temperatureK: place.temperatureK, humidityRatio: 0 });
  const from = saturated(here.pressureAbsPa, here.temperatureK);
  const there = saturated(place.pressureAbsPa, place.temperatureK);
  const vapourPa = here.humidityRatio * from.enhancementRatio * from.saturationPa;
  const carriedPa = (vapourPa * place.pressureAbsPa) / here.pressureAbsPa;
  return Math.min(1, carriedPa / (there.enhancementRatio * there.saturationPa));
}
