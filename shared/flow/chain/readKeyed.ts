import { OutOfRangeError } from '@/shared/units/outOfRange';
import { anyFlowM3PerS } from '@/shared/units/massFlow';
import { readNumber, readSignedNumber } from '@/shared/units/quantity';
import { toSi, unitsOf } from '@/shared/units/unitTables';
import { FlowUnit } from '@/shared/schema/primitives';
import type { KeyedFlow, KeyedPressure, Shown } from './chainTypes';

/** What was keyed, as SI in the instrument's own quantity: number · factor; percent / 100; a mass flow over the density.
 * @param keyed text and unit: of flow, of pressure (a plate's drop), or percent @param densityKgPerM3 for a mass flow, kg/m³
 * @returns value in m³/s, Pa, or share 0..1 @throws RangeError when it is not exactly one number
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B.
 * @example readKeyedFlow({ text: '64', unit: '%' }, 1.2) // { unit: "share", value: 0.640 }
 */
export function readKeyedFlow(keyed: KeyedFlow, densityKgPerM3: number): Shown {
  const { text, unit } = keyed;
  if (unit === '%') return { unit: 'share', value: readNumber(text) / 100 };
  const flowUnit = FlowUnit.safeParse(unit);
  if (flowUnit.success)
    return { unit: 'm3/s', value: anyFlowM3PerS({ text, unit: flowUnit.data, densityKgPerM3 }) };
  return { unit: 'Pa', value: toSi('pressure', readNumber(text), unit) };
}

/** What stood at rest, as SI, signed: number · factor, in the quantity of the reading it belongs to.
 * @param keyed text (a minus allowed) and unit of flow, of pressure, or percent @param densityKgPerM3 for a mass flow, kg/m³
 * @returns value in m³/s, Pa, or share, signed @throws RangeError when it is not exactly one number
 * Range: any. Source: NIST SP 811 (2008) appendix B.
 * @example readKeyedRest({ text: '-1', unit: 'mmH2O' }, 1.2) // { unit: "Pa", value: -9.80665 }
 */
export function readKeyedRest(keyed: KeyedFlow | KeyedPressure, densityKgPerM3: number): Shown {
  const sign = readSignedNumber(keyed.text) < 0 ? -1 : 1;
  const size = readKeyedFlow({ text: keyed.text.replace('-', ''), unit: keyed.unit }, densityKgPerM3);
  return { unit: size.unit, value: sign * size.value };
}

/** Test pressure as keyed, as SI: number · factor.
 * @param keyed text and unit of pressure @returns Pa @throws RangeError when it is not exactly one number
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B.
 * @example readKeyedPressurePa({ text: '28', unit: 'inH2O' }) // 6974.48948
 */
export function readKeyedPressurePa(keyed: KeyedPressure): number {
  if (!unitsOf('pressure').includes(keyed.unit))
    throw new OutOfRangeError('test pressure', `${keyed.unit} is not a unit of pressure.`);
  return toSi('pressure', readNumber(keyed.text), keyed.unit);
}
