import type { SessionSettings } from '@/shared/schema/records';
import { type AirState, airDensityKgPerM3 } from './moistAir';

export type ReferenceAirName = SessionSettings['referenceAir'];

export type ReferenceAir = AirState & { name: ReferenceAirName; label: string };

const fahrenheitK = (t: number) => (t + 459.67) / 1.8;

/** The airs a shop can bring its flows to, in the order they are offered. */
export const referenceAirs: readonly ReferenceAir[] = [
  {
    name: 'dry20C',
    label: '20 °C, 101.325 kPa, dry',
    pressureAbsPa: 101325,
    temperatureK: 293.15,
    humidityRatio: 0,
  },
  {
    name: 'isa',
    label: 'ISA sea level: 15 °C, 101.325 kPa, dry',
    pressureAbsPa: 101325,
    temperatureK: 288.15,
    humidityRatio: 0,
  },
  {
    name: 'saeJ607',
    label: 'SAE J607: 60 °F, 29.92 inHg, dry',
    pressureAbsPa: 29.92 * 3386.388640341,
    temperatureK: fahrenheitK(60),
    humidityRatio: 0,
  },
  {
    name: 'saeJ1349',
    label: 'SAE J1349: 25 °C, 99 kPa, dry',
    pressureAbsPa: 99000,
    temperatureK: 298.15,
    humidityRatio: 0,
  },
  {
    name: 'iso1217',
    label: 'ISO 1217: 20 °C, 100 kPa, dry',
    pressureAbsPa: 100000,
    temperatureK: 293.15,
    humidityRatio: 0,
  },
  {
    name: 'scfm',
    label: 'SCFM (ASME): 68 °F, 14.696 psi, 36 % humidity',
    pressureAbsPa: 14.696 * 6894.757293168,
    temperatureK: fahrenheitK(68),
    humidityRatio: 0.36,
  },
];

/** A reference air by its name. Formula: none, a table.
 * @param name name of the reference air
 * @returns its label, pressure (Pa), temperature (K) and humidity (0..1) @throws RangeError for an unknown name
 * Range: the names of `referenceAirs`.
 * Source: ISO 2533 (ISA), SAE J607, SAE J1349, ASME (SCFM); ISO 1217 from memory.
 * @example referenceAir('saeJ1349') // { pressureAbsPa: 99000, temperatureK: 298.15 }
 */
export function referenceAir(name: ReferenceAirName): ReferenceAir {
  const found = referenceAirs.find((air) => air.name === name);
  if (!found) throw new RangeError('no such reference air');
  return found;
}

/** Density of a reference air, by the same model as every measured one (CIPM-2007), so that air equal to the reference
 * changes nothing: ρ = p Ma/(Z R T)·[1 − xv(1 − Mv/Ma)].
 * @param name name of the reference air
 * @returns kg/m³ @throws RangeError for an unknown name
 * Range: the names of `referenceAirs`. Dry figures printed elsewhere as an ideal gas are up to 0.04 % lower.
 * Source: Picard et al., Metrologia 45 (2008) 149.
 * @example referenceDensityKgPerM3('dry20C') // 1.2045573
 */
export function referenceDensityKgPerM3(name: ReferenceAirName): number {
  return airDensityKgPerM3(referenceAir(name));
}
