import { between, positive, zeroOrMore } from '@/shared/units/outOfRange';

/** Flow from a share of full scale: Q = Q_fs · x on a linear scale, Q = Q_fs · √x where the share is one of pressure.
 * @param scale.openRatio what the instrument shows, 0..1 of full scale (0.70 for 70 %), zero already taken off
 * @param scale.fullScaleM3PerS flow at full scale of the range in use, m³/s
 * @param scale.law linear, or root for a share of a pressure
 * @returns m³/s @throws OutOfRangeError (a RangeError) for a share outside 0 to 1.5 or a full scale not above 0
 * Range: to 1.5 of full scale, so that a needle past its end is still read. Source: flow-maths, section 1, step 2.
 * @example fullScaleFlowM3PerS({ openRatio: 0.64, fullScaleM3PerS: 0.1, law: 'root' }) // 0.080
 */
export function fullScaleFlowM3PerS(scale: {
  openRatio: number;
  fullScaleM3PerS: number;
  law: 'linear' | 'root';
}): number {
  const share = between(scale.openRatio, 0, 1.5, 'share of full scale');
  return positive(scale.fullScaleM3PerS, 'full scale') * (scale.law === 'root' ? Math.sqrt(share) : share);
}

/** Pressure of a sloped tube of liquid: Δp = ρ g l sinα, g = 9.80665 m/s².
 * @param tube.lengthM length of the column along the tube, m @param tube.slopeRad slope against level, rad (π/2 upright)
 * @param tube.densityKgPerM3 density of the fluid, kg/m³ (water as in the inch of water: 1000)
 * @returns Pa @throws OutOfRangeError (a RangeError) for a negative length, a slope outside 0 to π/2 or no density
 * Range: slopes from about 3° to upright. Source: hydrostatics; NIST SP 811 for g.
 * @example tubePressurePa({ lengthM: 0.254, slopeRad: Math.PI / 2, densityKgPerM3: 1000 }) // 2490.8891
 */
export function tubePressurePa(tube: { lengthM: number; slopeRad: number; densityKgPerM3: number }): number {
  const slope = between(tube.slopeRad, 0, Math.PI / 2, 'slope of the tube');
  const density = positive(tube.densityKgPerM3, 'density of the fluid');
  return density * 9.80665 * zeroOrMore(tube.lengthM, 'column') * Math.sin(slope);
}
