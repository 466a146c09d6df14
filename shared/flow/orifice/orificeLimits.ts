import { positive } from '@/shared/units/outOfRange';
import { type DuctPlate, diameterRatio } from './dischargeCoefficient';

/** Limits of use of ISO 5167-2 that a plate in a duct leaves, as sentences. Shown, not enforced: d ≥ 12.5 mm,
 * 50 ≤ D ≤ 1000 mm, 0.1 ≤ β ≤ 0.75, p2/p1 ≥ 0.75; Re ≥ 5000 up to β = 0.56 and Re ≥ 16000β² above (corner, D and D/2),
 * Re ≥ 5000 and Re ≥ 170 β² D/mm (flange).
 * @param plate.ductDiameterM duct, m @param plate.boreM bore, m @param plate.tappings where the pressure is taken
 * @param ductReynolds Reynolds number on the duct diameter, dimensionless
 * @param pressureRatio absolute pressure behind over before the plate, 0..1
 * @returns sentences, none when every limit is kept @throws OutOfRangeError (a RangeError) for a plate that is none
 * Range: every plate with β below 0.98. Source: ISO 5167-2:2003, section 5.3.1 and 5.3.2.2.
 * @example orificeLimits({ ductDiameterM: 0.1, boreM: 0.06, tappings: 'corner' }, 70000, 0.98) // []
 */
export function orificeLimits(plate: DuctPlate, ductReynolds: number, pressureRatio: number): string[] {
  const beta = diameterRatio(plate);
  const re = positive(ductReynolds, 'Reynolds number');
  const ductMm = plate.ductDiameterM * 1000;
  const said: string[] = [];
  if (plate.boreM < 0.0125) said.push('The bore is below 12.5 mm, the smallest the standard covers.');
  if (ductMm < 50 || ductMm > 1000) said.push('The duct lies outside the 50 to 1000 mm of the standard.');
  if (beta < 0.1 || beta > 0.75) said.push('Bore over duct lies outside the 0.1 to 0.75 of the standard.');
  if (re < smallestReynolds(plate, beta, ductMm))
    said.push(`The flow is too slow for the standard: Reynolds number ${re.toFixed(0)}.`);
  if (pressureRatio < 0.75)
    said.push('The plate drops more than a quarter of the pressure: expansibility is beyond its range.');
  return said;
}

function smallestReynolds(plate: DuctPlate, beta: number, ductMm: number): number {
  if (plate.tappings === 'flange') return Math.max(5000, 170 * beta * beta * ductMm);
  return beta <= 0.56 ? 5000 : 16000 * beta * beta;
}
