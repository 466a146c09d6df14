import { OutOfRangeError, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** Rule by which the points of a traverse are laid. */
export type TraverseRule = 'logTchebycheff' | 'logLinear';

/** Distance from the wall over duct diameter of the points on one radius. */
const onRadius: Record<TraverseRule, Record<3 | 5, readonly number[]>> = {
  logTchebycheff: { 3: [0.032, 0.137, 0.312], 5: [0.019, 0.076, 0.155, 0.215, 0.357] },
  logLinear: { 3: [0.032, 0.135, 0.321], 5: [0.019, 0.077, 0.153, 0.217, 0.361] },
};

/** Points of a traverse on one whole diameter, from one wall to the other: y = (y/D)·D, and mirrored D − y.
 * @param traverse.rule log-Tchebycheff or log-linear @param traverse.pointsPerRadius 3 or 5
 * @param traverse.ductDiameterM duct, m
 * @returns distances from the wall, m, twice as many as on a radius @throws OutOfRangeError (a RangeError) for no such rule
 * Range: round ducts; take two diameters at right angles. Source: ISO 3966:2008 and ISO 5802:2001 (5 points: from memory).
 * @example traversePointsM({ rule: 'logLinear', pointsPerRadius: 3, ductDiameterM: 0.1 }) // [0.0032, 0.0135, 0.0321, 0.0679, 0.0865, 0.0968]
 */
export function traversePointsM(traverse: {
  rule: TraverseRule;
  pointsPerRadius: 3 | 5;
  ductDiameterM: number;
}): number[] {
  const duct = positive(traverse.ductDiameterM, 'duct diameter');
  const points = onRadius[traverse.rule]?.[traverse.pointsPerRadius];
  if (!points) throw new OutOfRangeError('traverse', 'There is no such rule for a traverse.');
  const near = points.map((ratio) => ratio * duct);
  return [...near, ...near.map((y) => duct - y).reverse()];
}

/** Flow of a traverse: Q = A · mean of the point velocities, A = π D²/4; each point stands for an equal share.
 * @param ductDiameterM duct, m @param velocitiesMPerS velocity at each point, m/s
 * @returns m³/s @throws OutOfRangeError (a RangeError) for no point, a velocity below 0 or a duct not above 0
 * Range: points laid by `traversePointsM`. Source: ISO 3966:2008, section 9.
 * @example traverseFlowM3PerS(0.1016, [10.16, 10.16]) // 0.0823704
 */
export function traverseFlowM3PerS(ductDiameterM: number, velocitiesMPerS: readonly number[]): number {
  if (velocitiesMPerS.length === 0)
    throw new OutOfRangeError('traverse', 'A traverse needs at least one point.');
  const sum = velocitiesMPerS.reduce((total, v) => total + zeroOrMore(v, 'velocity'), 0);
  return ((Math.PI / 4) * positive(ductDiameterM, 'duct diameter') ** 2 * sum) / velocitiesMPerS.length;
}
