import { OutOfRangeError, finite } from './outOfRange';

const inchM = 0.0254;
const footM = 0.3048;
const poundKg = 0.45359237;

/** What one of each unit is in coherent SI (m, m², m³, Pa, m³/s, kg/s, W, m/s, kg/m³).
 * The inch of water is the conventional one, 249.08891 Pa (not the one at 60 °F, 248.84 Pa, nor at 4 °C, 249.082 Pa).
 * The horsepower is the mechanical one, 550 ft·lbf/s. Source: NIST SP 811 (2008) appendix B.
 */
export const unitTables = {
  length: { m: 1, cm: 0.01, mm: 0.001, in: inchM, ft: footM },
  area: { m2: 1, cm2: 1e-4, mm2: 1e-6, in2: inchM ** 2, ft2: footM ** 2 },
  volume: { m3: 1, L: 1e-3, cc: 1e-6, in3: inchM ** 3, ft3: footM ** 3 },
  pressure: {
    Pa: 1,
    kPa: 1000,
    mbar: 100,
    hPa: 100,
    inH2O: 249.08891,
    mmH2O: 9.80665,
    inHg: 3386.388640341,
    psi: 6894.757293168,
  },
  volumeFlow: {
    'm3/s': 1,
    cfm: 0.028316846592 / 60,
    'L/s': 1e-3,
    'm3/h': 1 / 3600,
    'm3/min': 1 / 60,
  },
  massFlow: { 'kg/s': 1, 'kg/h': 1 / 3600, 'lb/min': poundKg / 60 },
  power: { W: 1, kW: 1000, hp: 745.69987158227 },
  speed: { 'm/s': 1, 'ft/s': footM, 'ft/min': footM / 60 },
  density: { 'kg/m3': 1, 'lb/ft3': poundKg / 0.028316846592 },
} as const;

export type QuantityKind = keyof typeof unitTables;

/** Names of the units a kind of quantity can be written in, in the order they are offered.
 * Formula: none, the keys of the table.
 * @param kind kind of quantity @returns unit names, text @throws nothing: the kinds are closed
 * Range: every kind of `unitTables`. Source: NIST SP 811 (2008) appendix B.
 * @example unitsOf('power') // ["W", "kW", "hp"]
 */
export function unitsOf(kind: QuantityKind): string[] {
  return Object.keys(unitTables[kind]);
}

function factorOf(kind: QuantityKind, unit: string): number {
  const table: Readonly<Record<string, number>> = unitTables[kind];
  const factor = Object.hasOwn(table, unit) ? table[unit] : undefined;
  if (factor === undefined) throw new OutOfRangeError('unit', `${unit} is not a unit of this quantity.`);
  return factor;
}

/** A quantity in coherent SI: x_SI = x · factor.
 * @param kind kind of quantity @param value number in `unit` @param unit one of `unitsOf(kind)`
 * @returns the number in coherent SI (m, m², m³, Pa, m³/s, kg/s, W, m/s or kg/m³)
 * @throws OutOfRangeError (a RangeError) for a unit of another kind or a number that is not finite
 * Range: any finite number; temperatures are not here, they have an offset. Source: NIST SP 811 (2008) appendix B.
 * @example toSi('speed', 1, 'ft/min') // 0.00508
 */
export function toSi(kind: QuantityKind, value: number, unit: string): number {
  return finite(value, 'number') * factorOf(kind, unit);
}

/** A quantity out of coherent SI: x = x_SI / factor.
 * @param kind kind of quantity @param valueSi number in coherent SI @param unit one of `unitsOf(kind)`
 * @returns the number in `unit` @throws OutOfRangeError (a RangeError) for a unit of another kind or a number not finite
 * Range: any finite number. Source: NIST SP 811 (2008) appendix B.
 * @example fromSi('volumeFlow', 1, 'cfm') // 2118.880003
 */
export function fromSi(kind: QuantityKind, valueSi: number, unit: string): number {
  return finite(valueSi, 'number') / factorOf(kind, unit);
}
