import { positive, zeroOrMore } from '@/shared/units/outOfRange';
import { type InletState, idealFlow } from './isentropic';

/** A flow as it was, not scaled to another pressure: volume at the inlet of the test piece, with the state there. */
export type UnscaledFlow = InletState & { flowM3PerS: number };

/** Area through which loss-free air would give this flow: A_eff = ρ0 Q / (ṁ/A)_ideal. It is Cd · A of any chosen area.
 * @param flow.flowM3PerS flow at the inlet state, **not scaled** to another pressure, m³/s
 * @param flow.pressureAbsPa absolute pressure at the inlet, Pa @param flow.densityKgPerM3 density there, kg/m³
 * @param flow.pressureDropPa the test pressure it was read at, Pa
 * @returns m² @throws OutOfRangeError (a RangeError) for a negative flow, or air and pressures not above 0
 * Range: any pressure ratio. A flow scaled by the root from 10 to 28 inH2O first would read up to 2.5 % high.
 * Source: Heywood, Internal Combustion Engine Fundamentals, section 6.3.2 and app. C.
 * @example effectiveAreaM2({ flowM3PerS: 0.1227063, pressureAbsPa: 101325, densityKgPerM3: 1.20410543, pressureDropPa: 6974.48948 }) // 0.001184575
 */
export function effectiveAreaM2(flow: UnscaledFlow): number {
  const massKgPerS =
    zeroOrMore(flow.flowM3PerS, 'flow') * positive(flow.densityKgPerM3, 'density of the air');
  return massKgPerS / idealFlow(flow).massFluxKgPerSM2;
}

/** Discharge coefficient on a chosen area (curtain, three-stage, head or throat): Cd = A_eff / A.
 * @param flow.flowM3PerS flow at the inlet state, **not scaled** to another pressure, m³/s
 * @param flow.pressureAbsPa absolute pressure at the inlet, Pa @param flow.densityKgPerM3 density there, kg/m³
 * @param flow.pressureDropPa the test pressure it was read at, Pa @param areaM2 the chosen area, m²
 * @returns dimensionless @throws OutOfRangeError (a RangeError) where `effectiveAreaM2` does or for an area not above 0
 * Range: 0 to about 1; a little above 1 is recovery behind the section, more is doubtful.
 * Source: Heywood, Internal Combustion Engine Fundamentals, section 6.3.2.
 * @example dischargeCoefficient({ flowM3PerS: 0.1227063, pressureAbsPa: 101325, densityKgPerM3: 1.20410543, pressureDropPa: 6974.48948 }, 0.002047096) // 0.578661
 */
export function dischargeCoefficient(flow: UnscaledFlow, areaM2: number): number {
  return effectiveAreaM2(flow) / positive(areaM2, 'area');
}
