import type { DecimalMark, FlowUnit, LengthUnit, PressureUnit } from '@/shared/schema/primitives';
import { KeyedText, SignedKeyedText } from '@/shared/schema/primitives';
import { unitTables } from './unitTables';

/** Reads one number as keyed, with a point or a comma. Formula: none.
 * @param text digits with at most one decimal mark, in the unit of its own field
 * @returns the number, in the same unit @throws RangeError when the text is not exactly one number
 * Range: 0 to 9999999.999999. Source: product.md, what is keyed is evidence.
 * @example readNumber('241,5') // 241.5
 */
export function readNumber(text: string): number {
  if (!KeyedText.safeParse(text).success) throw new RangeError('not one number');
  return Number(text.replace(',', '.'));
}

/** Reads one number as keyed that may be below zero: temperatures, zeros, lift zero. Formula: none.
 * @param text a minus or none, then digits with at most one decimal mark, in the unit of its own field
 * @returns the number, in the same unit @throws RangeError when the text is not exactly one number
 * Range: −9999999.999999 to 9999999.999999. Source: product.md, what is keyed is evidence.
 * @example readSignedNumber('-0,002') // -0.002
 */
export function readSignedNumber(text: string): number {
  if (!SignedKeyedText.safeParse(text).success) throw new RangeError('not one number');
  return Number(text.replace(',', '.'));
}

function volumeFactor(unit: FlowUnit): number | undefined {
  return unit === 'kg/h' || unit === 'lb/min' ? undefined : unitTables.volumeFlow[unit];
}

/** True for units of volume flow; a mass flow needs a density before it can be compared. Formula: none.
 * @param unit unit of flow @returns true or false @throws nothing: the units are closed
 * Range: every unit of flow. Source: NIST SP 811 (2008) appendix B.
 * @example isVolumeFlow('kg/h') // false
 */
export function isVolumeFlow(unit: FlowUnit): boolean {
  return volumeFactor(unit) !== undefined;
}

/** Volume flow in SI: Q = number · factor.
 * @param text flow as keyed, in `unit` @param unit unit of volume flow
 * @returns m³/s @throws RangeError when it is not one number, or for a mass-flow unit, which needs a density
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B, 1 ft³ = 0.028316846592 m³.
 * @example flowM3PerS('300', 'cfm') // 0.1415842
 */
export function flowM3PerS(text: string, unit: FlowUnit): number {
  const factor = volumeFactor(unit);
  if (factor === undefined) throw new RangeError(`${unit} is a mass flow and needs a density`);
  return readNumber(text) * factor;
}

/** Pressure in SI: p = number · factor.
 * @param text pressure as keyed, in `unit` @param unit unit of pressure
 * @returns Pa @throws RangeError when it is not one number
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B; conventional inch of water 249.08891 Pa.
 * @example pressureInPa('28', 'inH2O') // 6974.48948
 */
export function pressureInPa(text: string, unit: PressureUnit): number {
  return readNumber(text) * unitTables.pressure[unit];
}

/** Length in SI: l = number · factor.
 * @param text length as keyed, in `unit` @param unit unit of length
 * @returns m @throws RangeError when it is not one number
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B, 1 in = 25.4 mm.
 * @example lengthInM('10', 'mm') // 0.01
 */
export function lengthInM(text: string, unit: LengthUnit): number {
  return readNumber(text) * unitTables.length[unit];
}

/** Volume flow from SI into a volume-flow unit: number = Q / factor.
 * @param valueM3PerS volume flow, m³/s @param unit unit of volume flow
 * @returns number in that unit @throws RangeError for a mass-flow unit, which needs a density
 * Range: any finite number. Source: NIST SP 811 (2008) appendix B.
 * @example flowFromSi(0.1415842, 'cfm') // 300.000
 */
export function flowFromSi(valueM3PerS: number, unit: FlowUnit): number {
  const factor = volumeFactor(unit);
  if (factor === undefined) throw new RangeError(`${unit} is a mass flow and needs a density`);
  return valueM3PerS / factor;
}

/** A number as the shop writes it: fixed decimals, the shop's decimal mark. Formula: none.
 * @param value number, any unit @param decimals digits after the mark, 0 to 20 @param mark point or comma
 * @returns text @throws RangeError when decimals are outside 0 to 20
 * Range: any finite number below 1e21. Source: product.md, display units are text at the edges.
 * @example showNumber(241.46, 1, ',') // "241,5"
 */
export function showNumber(value: number, decimals: number, mark: DecimalMark): string {
  return value.toFixed(decimals).replace('.', mark);
}
