import { heatRatio } from '@/shared/flow/air/dryAir';
import { between, positive } from '@/shared/units/outOfRange';

const half = (heatRatio - 1) / 2;

/** Static over stagnation pressure below which a nozzle is choked: r* = (2/(γ+1))^(γ/(γ−1)), dimensionless. */
export const chokedPressureRatio = (2 / (heatRatio + 1)) ** (heatRatio / (heatRatio - 1));

/** Mass flow coefficient when choked: √γ · (2/(γ+1))^((γ+1)/(2(γ−1))), dimensionless, in ṁ = c A p0/√(R T0). */
export const chokedCoefficient =
  Math.sqrt(heatRatio) * (2 / (heatRatio + 1)) ** ((heatRatio + 1) / (2 * (heatRatio - 1)));

/** Static over stagnation pressure at a Mach number: p/p0 = (1 + (γ−1)/2 · M²)^(−γ/(γ−1)), γ = 1.4.
 * @param mach Mach number, dimensionless
 * @returns 0..1 @throws OutOfRangeError (a RangeError) outside 0 to 5
 * Range: 0 to 5. Source: NACA Report 1135, eq. 44.
 * @example pressureRatioAtMach(0.3) // 0.939470
 */
export function pressureRatioAtMach(mach: number): number {
  return (1 + half * between(mach, 0, 5, 'Mach number') ** 2) ** (-heatRatio / (heatRatio - 1));
}

/** Static over stagnation density at a Mach number: ρ/ρ0 = (1 + (γ−1)/2 · M²)^(−1/(γ−1)), γ = 1.4.
 * @param mach Mach number, dimensionless
 * @returns 0..1 @throws OutOfRangeError (a RangeError) outside 0 to 5
 * Range: 0 to 5. Source: NACA Report 1135, eq. 45.
 * @example densityRatioAtMach(0.5) // 0.885170
 */
export function densityRatioAtMach(mach: number): number {
  return (1 + half * between(mach, 0, 5, 'Mach number') ** 2) ** (-1 / (heatRatio - 1));
}

/** Static over stagnation temperature at a Mach number: T/T0 = 1/(1 + (γ−1)/2 · M²), γ = 1.4.
 * @param mach Mach number, dimensionless
 * @returns 0..1 @throws OutOfRangeError (a RangeError) outside 0 to 5
 * Range: 0 to 5. Source: NACA Report 1135, eq. 43.
 * @example temperatureRatioAtMach(0.5) // 0.9524
 */
export function temperatureRatioAtMach(mach: number): number {
  return 1 / (1 + half * between(mach, 0, 5, 'Mach number') ** 2);
}

/** Area over the area at the speed of sound: A/A* = (1/M)·[(1 + (γ−1)/2 · M²)/((γ+1)/2)]^((γ+1)/(2(γ−1))), γ = 1.4.
 * @param mach Mach number, dimensionless
 * @returns 1 or more, dimensionless @throws OutOfRangeError (a RangeError) outside 1e-6 to 5
 * Range: 1e-6 to 5. Source: NACA Report 1135, eq. 80.
 * @example areaRatioAtMach(0.8) // 1.038230
 */
export function areaRatioAtMach(mach: number): number {
  const m = between(mach, 1e-6, 5, 'Mach number');
  return ((1 + half * m * m) / (1 + half)) ** ((heatRatio + 1) / (2 * (heatRatio - 1))) / m;
}

/** Mach number at a static over stagnation pressure: M = √(2/(γ−1) · (r^(−(γ−1)/γ) − 1)), γ = 1.4.
 * @param pressureRatio static over stagnation pressure, 0..1
 * @returns Mach number, dimensionless @throws OutOfRangeError (a RangeError) outside 0.0019 to 1
 * Range: 0.0019 (Mach 5) to 1. Source: NACA Report 1135, eq. 44 turned round.
 * @example machAtPressureRatio(0.939470) // 0.30000
 */
export function machAtPressureRatio(pressureRatio: number): number {
  const r = between(pressureRatio, 0.0019, 1, 'pressure ratio');
  return Math.sqrt((r ** (-(heatRatio - 1) / heatRatio) - 1) / half);
}

/** Air at the inlet of the test piece (stagnation), and the test pressure it is drawn or blown with. */
export type InletState = { pressureAbsPa: number; densityKgPerM3: number; pressureDropPa: number };

export type IdealFlow = {
  /** velocity at the smallest section, m/s */
  velocityMPerS: number;
  mach: number;
  /** mass flow per area of it, kg/(s m²) */
  massFluxKgPerSM2: number;
  /** static pressure there over the inlet's, 0..1 */
  pressureRatio: number;
  isChoked: boolean;
};

/** Loss-free flow through the smallest section, compressible: with r = pT/p0 (not below r*),
 * V = √(2γ/(γ−1) · p0/ρ0 · (1 − r^((γ−1)/γ))), ṁ/A = √(p0 ρ0) · r^(1/γ) · √(2γ/(γ−1) · (1 − r^((γ−1)/γ))), γ = 1.4.
 * p0/ρ0 stands for R T0, so that humid air needs no gas constant of its own.
 * @param state.pressureAbsPa absolute pressure at the inlet of the test piece, Pa
 * @param state.densityKgPerM3 density there, kg/m³ @param state.pressureDropPa test pressure, Pa
 * @returns velocity m/s, Mach number, mass flux kg/(s m²), pressure ratio 0..1, and whether it is choked (flagged)
 * @throws OutOfRangeError (a RangeError) unless all are above 0 and the test pressure is below the absolute pressure
 * Range: any pressure ratio; below 0.528 choked. Source: Heywood, Internal Combustion Engine Fundamentals, app. C; NACA 1135.
 * @example idealFlow({ pressureAbsPa: 101325, densityKgPerM3: 1.20410543, pressureDropPa: 6974.48948 }) // { velocityMPerS: 109.0002, mach: 0.32082, massFluxKgPerSM2: 124.72941 }
 */
export function idealFlow(state: InletState): IdealFlow {
  const p0 = positive(state.pressureAbsPa, 'absolute pressure');
  const density = positive(state.densityKgPerM3, 'density of the air');
  const drop = between(positive(state.pressureDropPa, 'test pressure'), 0, p0, 'test pressure in Pa');
  const isChoked = 1 - drop / p0 <= chokedPressureRatio;
  const pressureRatio = isChoked ? chokedPressureRatio : 1 - drop / p0;
  const gamma = heatRatio;
  // 1 − r^k by expm1 and log1p: at small test pressures the plain difference loses its digits
  const lost = -Math.expm1(
    ((gamma - 1) / gamma) * (isChoked ? Math.log(pressureRatio) : Math.log1p(-drop / p0)),
  );
  const root = Math.sqrt(((2 * gamma) / (gamma - 1)) * lost);
  return {
    velocityMPerS: Math.sqrt(p0 / density) * root,
    mach: machAtPressureRatio(pressureRatio),
    massFluxKgPerSM2: Math.sqrt(p0 * density) * pressureRatio ** (1 / gamma) * root,
    pressureRatio,
    isChoked,
  };
}
