import { OutOfRangeError, between, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** Area of a circle, as of a valve head or a plate's bore: A = π D²/4.
 * @param diameterM diameter, m
 * @returns m² @throws OutOfRangeError (a RangeError) unless finite and above 0
 * Range: above 0. Source: geometry.
 * @example circleAreaM2(0.04) // 0.001256637
 */
export function circleAreaM2(diameterM: number): number {
  return (Math.PI / 4) * positive(diameterM, 'diameter') ** 2;
}

/** Curtain area of a valve: A = π Dv L.
 * @param headDiameterM head diameter of the valve, m @param liftM lift, m
 * @returns m² @throws OutOfRangeError (a RangeError) for a diameter not above 0 or a lift below 0
 * Range: lift 0 on; above L/D 0.25 it exceeds the head's area. Source: Heywood, section 6.3.2.
 * @example curtainAreaM2(0.04, 0.01) // 0.001256637
 */
export function curtainAreaM2(headDiameterM: number, liftM: number): number {
  return Math.PI * positive(headDiameterM, 'head diameter') * zeroOrMore(liftM, 'lift');
}

/** Net area of a throat: A = π (Dp² − Ds²)/4.
 * @param throatDiameterM throat, m @param stemDiameterM stem, m; 0 when there is none in the throat
 * @returns m² @throws OutOfRangeError (a RangeError) for a throat not above 0, or a stem that fills it
 * Range: stem below throat. Source: Heywood, section 6.3.2.
 * @example throatAreaM2(0.034, 0.007) // 0.00086943577
 */
export function throatAreaM2(throatDiameterM: number, stemDiameterM: number): number {
  const throat = positive(throatDiameterM, 'throat diameter');
  const stem = zeroOrMore(stemDiameterM, 'stem diameter');
  if (stem >= throat) throw new OutOfRangeError('stem diameter', 'The stem must be thinner than the throat.');
  return (Math.PI / 4) * (throat ** 2 - stem ** 2);
}

/** Throat from a share of the head diameter, the way shops say it ("an 88 % throat"): Dp = share · Dv.
 * @param headDiameterM head diameter of the valve, m @param throatRatio share of it, 0..1 (0.88 for 88 %)
 * @returns m @throws OutOfRangeError (a RangeError) for a diameter not above 0 or a share outside 0.3 to 1
 * Range: 0.3 to 1; usual 0.85 to 0.92. Source: common practice of the trade.
 * @example throatFromRatioM(0.04, 0.88) // 0.03520
 */
export function throatFromRatioM(headDiameterM: number, throatRatio: number): number {
  return positive(headDiameterM, 'head diameter') * between(throatRatio, 0.3, 1, 'throat over head diameter');
}

/** Throat as a share of the head diameter: share = Dp / Dv.
 * @param headDiameterM head diameter of the valve, m @param throatDiameterM throat, m
 * @returns 0..1 @throws OutOfRangeError (a RangeError) unless both are above 0 and the share lies within 0.3 to 1
 * Range: 0.3 to 1. Source: common practice of the trade.
 * @example throatRatio(0.04, 0.034) // 0.850
 */
export function throatRatio(headDiameterM: number, throatDiameterM: number): number {
  const share = positive(throatDiameterM, 'throat diameter') / positive(headDiameterM, 'head diameter');
  return between(share, 0.3, 1, 'throat over head diameter');
}

/** Area of a port with several valves: A = Σ Ai, over the valves that open.
 * @param areasM2 area of each valve that opens, m²
 * @returns m² @throws OutOfRangeError (a RangeError) for no valve at all, or an area below 0
 * Range: one valve on. Source: Heywood, section 6.3.2.
 * @example summedAreaM2([0.0008, 0.0007]) // 0.00150
 */
export function summedAreaM2(areasM2: readonly number[]): number {
  if (areasM2.length === 0) throw new OutOfRangeError('valves', 'At least one valve must open.');
  return areasM2.reduce((sum, areaM2) => sum + zeroOrMore(areaM2, 'area'), 0);
}

/** Mean velocity in a section: V = Q / A.
 * @param flowM3PerS volume flow, m³/s @param areaM2 area of the section, m²
 * @returns m/s @throws OutOfRangeError (a RangeError) for a flow below 0 or an area not above 0
 * Range: 0 on. Source: geometry.
 * @example meanVelocityMPerS(0.1, 0.002) // 50.0
 */
export function meanVelocityMPerS(flowM3PerS: number, areaM2: number): number {
  return zeroOrMore(flowM3PerS, 'flow') / positive(areaM2, 'area');
}
