import { positive, zeroOrMore } from '@/shared/units/outOfRange';
import { throatAreaM2 } from './areas';

/** Lift over head diameter at which the curtain equals the head's area: πDvL = πDv²/4 at L/D = 0.25, dimensionless. */
export const curtainMatchesHead = 0.25;

/** Lift over head diameter: L/D.
 * @param liftM lift, m @param headDiameterM head diameter of the valve, m
 * @returns dimensionless @throws OutOfRangeError (a RangeError) for a lift below 0 or a diameter not above 0
 * Range: 0 on; usual to 0.4. Source: common practice of the trade.
 * @example liftOverDiameter(0.01, 0.04) // 0.250
 */
export function liftOverDiameter(liftM: number, headDiameterM: number): number {
  return zeroOrMore(liftM, 'lift') / positive(headDiameterM, 'head diameter');
}

/** Lift of another valve that stands at the same L/D: L2 = L1 · D2 / D1.
 * @param liftM lift of the first valve, m @param headDiameterM its head diameter, m
 * @param otherHeadDiameterM head diameter of the other valve, m
 * @returns m @throws OutOfRangeError (a RangeError) for a lift below 0 or diameters not above 0
 * Range: 0 on. Source: geometry, similar valves at equal L/D.
 * @example equivalentLiftM(0.0127, 0.04, 0.032) // 0.010160
 */
export function equivalentLiftM(liftM: number, headDiameterM: number, otherHeadDiameterM: number): number {
  return liftOverDiameter(liftM, headDiameterM) * positive(otherHeadDiameterM, 'head diameter');
}

/** Marks on a curve over lift: where the curtain equals the head's area, and where it equals the net throat. */
export type LiftMarks = { headMatchedLiftM: number; throatMatchedLiftM: number };

/** The two marks to draw: L = Dv/4 where the curtain equals the head's area, and L = (Dp² − Ds²)/(4 Dv) where it equals the
 * net throat. Below the first, valve and seat govern and above it the port: practice, no law.
 * @param valve.headDiameterM head, m @param valve.throatDiameterM throat, m @param valve.stemDiameterM stem, m
 * @returns both lifts, m @throws OutOfRangeError (a RangeError) unless 0 ≤ stem < throat and the head is above 0
 * Range: usual throats are matched at L/D 0.17 to 0.20. Source: geometry; the reading of it is common practice of the trade.
 * @example liftMarks({ headDiameterM: 0.04, throatDiameterM: 0.035, stemDiameterM: 0.007 }) // { headMatchedLiftM: 0.0100, throatMatchedLiftM: 0.0073500 }
 */
export function liftMarks(valve: {
  headDiameterM: number;
  throatDiameterM: number;
  stemDiameterM: number;
}): LiftMarks {
  const head = positive(valve.headDiameterM, 'head diameter');
  return {
    headMatchedLiftM: curtainMatchesHead * head,
    throatMatchedLiftM: throatAreaM2(valve.throatDiameterM, valve.stemDiameterM) / (Math.PI * head),
  };
}
