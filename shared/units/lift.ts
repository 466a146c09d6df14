import type { LiftUnit } from '@/shared/schema/primitives';
import { OutOfRangeError, positive, zeroOrMore } from './outOfRange';
import { lengthInM, readNumber } from './quantity';
import { unitTables } from './unitTables';

const noDiameter = 'A lift given as L/D needs the valve’s head diameter.';

/** Lift as a length: L = number · factor, or L = (L/D) · D for a multiple of the head diameter.
 * @param lift.text lift as keyed, in `lift.unit` @param lift.unit in, mm or L/D
 * @param lift.headDiameterM head diameter of the valve, m; null when it is not known
 * @returns m @throws RangeError when it is not one number, OutOfRangeError for L/D without a diameter above 0
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B; L/D is the trade's way to compare valves of unequal size.
 * @example liftInM({ text: '0.25', unit: 'L/D', headDiameterM: 0.04 }) // 0.010
 */
export function liftInM(lift: { text: string; unit: LiftUnit; headDiameterM: number | null }): number {
  if (lift.unit !== 'L/D') return lengthInM(lift.text, lift.unit);
  if (lift.headDiameterM === null) throw new OutOfRangeError('head diameter', noDiameter);
  return readNumber(lift.text) * positive(lift.headDiameterM, 'head diameter');
}

/** A length as a lift: number = L / factor, or number = L / D for a multiple of the head diameter.
 * @param lift.liftM lift, m @param lift.unit in, mm or L/D
 * @param lift.headDiameterM head diameter of the valve, m; null when it is not known
 * @returns number in `lift.unit` @throws OutOfRangeError (a RangeError) for a negative lift or L/D without a diameter
 * Range: 0 on. Source: NIST SP 811 (2008) appendix B.
 * @example liftFromM({ liftM: 0.0127, unit: 'in', headDiameterM: null }) // 0.500
 */
export function liftFromM(lift: { liftM: number; unit: LiftUnit; headDiameterM: number | null }): number {
  const liftM = zeroOrMore(lift.liftM, 'lift');
  if (lift.unit !== 'L/D') return liftM / unitTables.length[lift.unit];
  if (lift.headDiameterM === null) throw new OutOfRangeError('head diameter', noDiameter);
  return liftM / positive(lift.headDiameterM, 'head diameter');
}
