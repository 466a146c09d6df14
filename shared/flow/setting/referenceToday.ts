import { expansibility } from '@/shared/flow/orifice/dischargeCoefficient';
import { positive } from '@/shared/units/outOfRange';

/** A state air is measured in: absolute pressure, density, and the test pressure. */
export type ReferenceState = { pressureAbsPa: number; densityKgPerM3: number; pressureDropPa: number };

/** What a reference passes today: Q = Q_stated · √(Δp/Δp_stated) · √(ρ_stated/ρ) · ε/ε_stated, as volume at the inlet.
 * The last factor is a plate's own expansibility; a head has none of its own and takes 1.
 * @param reference.kind plate or head @param reference.flowM3PerS stated flow, m³/s at the stated state
 * @param stated.pressureAbsPa absolute pressure it is stated for, Pa @param stated.densityKgPerM3 density there, kg/m³
 * @param stated.pressureDropPa test pressure it is stated for, Pa
 * @param today.pressureAbsPa absolute pressure today, Pa @param today.densityKgPerM3 density today, kg/m³
 * @param today.pressureDropPa test pressure today, Pa
 * @returns m³/s at today's inlet state @throws OutOfRangeError (a RangeError) unless all are above 0, drops below pressures
 * Range: Reynolds number alike; a head's root reads high when scaled up (1.1 to 2.5 % from 10 to 28 inH2O).
 * Source: Bernoulli; expansibility ISO 5167-2:2003, eq. 5 for β → 0.
 * @example referenceFlowTodayM3PerS({ kind: 'head', flowM3PerS: 0.1 }, { pressureAbsPa: 101325, densityKgPerM3: 1.2, pressureDropPa: 2500 }, { pressureAbsPa: 101325, densityKgPerM3: 1.2, pressureDropPa: 10000 }) // 0.200
 */
export function referenceFlowTodayM3PerS(
  reference: { kind: 'plate' | 'head'; flowM3PerS: number },
  stated: ReferenceState,
  today: ReferenceState,
): number {
  const drops =
    positive(today.pressureDropPa, 'test pressure') / positive(stated.pressureDropPa, 'stated test pressure');
  const airs =
    positive(stated.densityKgPerM3, 'stated density') / positive(today.densityKgPerM3, 'density of the air');
  const plateShare =
    reference.kind === 'plate'
      ? expansibility(0, today.pressureAbsPa, today.pressureDropPa) /
        expansibility(0, stated.pressureAbsPa, stated.pressureDropPa)
      : 1;
  return positive(reference.flowM3PerS, 'stated flow') * Math.sqrt(drops * airs) * plateShare;
}
