import type { DecimalMark, FlowUnit, LengthUnit, PressureUnit } from '@/shared/schema/primitives';
import { KeyedText } from '@/shared/schema/primitives';

/** Factor to SI of each unit of flow that needs no density, m³/s.
 * Source: NIST SP 811 appendix B (1 ft³ = 0.028316846592 m³ exactly).
 */
const volumeFlowM3PerS: Partial<Record<FlowUnit, number>> = {
  cfm: 0.028316846592 / 60,
  'L/s': 1e-3,
  'm3/h': 1 / 3600,
  'm3/min': 1 / 60,
};

/** Factor to Pa of each unit of pressure. The inch of water is the conventional one.
 * Source: NIST SP 811 appendix B; conventional inH2O 249.08891 Pa, inHg 3386.388640341 Pa.
 */
const pressurePa: Record<PressureUnit, number> = {
  inH2O: 249.08891,
  mmH2O: 9.80665,
  kPa: 1000,
  mbar: 100,
  inHg: 3386.388640341,
  psi: 6894.757293168,
};

const lengthM: Record<LengthUnit, number> = { in: 0.0254, mm: 0.001 };

/** Reads one number as keyed, with a point or a comma.
 * @returns the number, dimensionless @throws RangeError when the text is not exactly one number
 * @example readNumber('241,5') // 241.5
 */
export function readNumber(text: string): number {
  if (!KeyedText.safeParse(text).success) throw new RangeError('not one number');
  return Number(text.replace(',', '.'));
}

/** True for units of volume flow; a mass flow needs a density before it can be compared. */
export function isVolumeFlow(unit: FlowUnit): boolean {
  return volumeFlowM3PerS[unit] !== undefined;
}

/** Volume flow in SI. @returns m³/s @throws RangeError for a mass-flow unit, which needs a density
 * @example flowM3PerS('300', 'cfm') // 0.1415842
 */
export function flowM3PerS(text: string, unit: FlowUnit): number {
  const factor = volumeFlowM3PerS[unit];
  if (factor === undefined) throw new RangeError(`${unit} is a mass flow and needs a density`);
  return readNumber(text) * factor;
}

/** Pressure in SI. @returns Pa @example pressureInPa('28', 'inH2O') // 6974.48948 */
export function pressureInPa(text: string, unit: PressureUnit): number {
  return readNumber(text) * pressurePa[unit];
}

/** Length in SI. @returns m @example lengthInM('10', 'mm') // 0.01 */
export function lengthInM(text: string, unit: LengthUnit): number {
  return readNumber(text) * lengthM[unit];
}

/** Volume flow from SI into a volume-flow unit. @returns number in that unit @throws RangeError for a mass-flow unit */
export function flowFromSi(valueM3PerS: number, unit: FlowUnit): number {
  const factor = volumeFlowM3PerS[unit];
  if (factor === undefined) throw new RangeError(`${unit} is a mass flow and needs a density`);
  return valueM3PerS / factor;
}

/** A number as the shop writes it: fixed decimals, the shop's decimal mark. */
export function showNumber(value: number, decimals: number, mark: DecimalMark): string {
  return value.toFixed(decimals).replace('.', mark);
}
