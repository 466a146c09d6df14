import { between, positive } from '@/shared/units/outOfRange';

/** Where the pressure is taken: in the corners of the plate, at D and D/2, or 25.4 mm before and behind it (flange). */
export type Tappings = 'corner' | 'dAndHalfD' | 'flange';

/** A plate in a duct: diameter of the duct, bore of the plate, tappings. */
export type DuctPlate = { ductDiameterM: number; boreM: number; tappings: Tappings };

/** Guards a plate in a duct; β = d/D must stay below 1.
 * @param plate.ductDiameterM duct, m @param plate.boreM bore, m @param plate.tappings where the pressure is taken
 * @returns diameter ratio β = d/D, 0..1 @throws OutOfRangeError (a RangeError) unless 0 < d < 0.98 D
 * Range: β below 0.98; ISO's own limits are flagged by `orificeLimits`. Source: ISO 5167-1:2003, section 3.3.
 * @example diameterRatio({ ductDiameterM: 0.1, boreM: 0.06, tappings: 'corner' }) // 0.60
 */
export function diameterRatio(plate: DuctPlate): number {
  const duct = positive(plate.ductDiameterM, 'duct diameter');
  return between(positive(plate.boreM, 'bore of the plate') / duct, 0, 0.98, 'bore over duct diameter');
}

function tapDistances(plate: DuctPlate): { l1: number; l2: number } {
  switch (plate.tappings) {
    case 'corner':
      return { l1: 0, l2: 0 };
    case 'dAndHalfD':
      return { l1: 1, l2: 0.47 };
    case 'flange':
      return { l1: 0.0254 / plate.ductDiameterM, l2: 0.0254 / plate.ductDiameterM };
  }
}

/** Discharge coefficient of a plate in a duct, Reader-Harris/Gallagher:
 * C = 0.5961 + 0.0261β² − 0.216β⁸ + 0.000521(10⁶β/Re)^0.7 + (0.0188 + 0.0063A)β^3.5(10⁶/Re)^0.3
 * + (0.043 + 0.080e^(−10L1) − 0.123e^(−7L1))(1 − 0.11A)β⁴/(1−β⁴) − 0.031(M2 − 0.8M2^1.1)β^1.3,
 * + 0.011(0.75 − β)(2.8 − D/25.4 mm) below D = 71.12 mm; A = (19000β/Re)^0.8; M2 = 2L2/(1−β).
 * @param plate.ductDiameterM duct, m @param plate.boreM bore, m @param plate.tappings where the pressure is taken
 * @param ductReynolds Reynolds number on the duct diameter, dimensionless
 * @returns dimensionless @throws OutOfRangeError (a RangeError) for a plate that is none or Re not above 0
 * Range: limits of use are shown by `orificeLimits`, not enforced. Source: ISO 5167-2:2003, eq. 4.
 * @example orificeCoefficient({ ductDiameterM: 0.07391, boreM: 0.0222, tappings: 'corner' }, 115331.66) // 0.6000085
 */
export function orificeCoefficient(plate: DuctPlate, ductReynolds: number): number {
  const beta = diameterRatio(plate);
  const re = positive(ductReynolds, 'Reynolds number');
  const { l1, l2 } = tapDistances(plate);
  const a = ((19000 * beta) / re) ** 0.8;
  const m2 = (2 * l2) / (1 - beta);
  const b4 = beta ** 4;
  const ductMm = plate.ductDiameterM * 1000;
  return (
    0.5961 +
    0.0261 * beta ** 2 -
    0.216 * beta ** 8 +
    0.000521 * ((1e6 * beta) / re) ** 0.7 +
    (0.0188 + 0.0063 * a) * beta ** 3.5 * (1e6 / re) ** 0.3 +
    ((0.043 + 0.08 * Math.exp(-10 * l1) - 0.123 * Math.exp(-7 * l1)) * (1 - 0.11 * a) * b4) / (1 - b4) -
    0.031 * (m2 - 0.8 * m2 ** 1.1) * beta ** 1.3 +
    (ductMm < 71.12 ? 0.011 * (0.75 - beta) * (2.8 - ductMm / 25.4) : 0)
  );
}

/** Discharge coefficient of a truly sharp thin plate in the wall of a plenum, Reader-Harris/Gallagher for β → 0:
 * C = 0.5961 + 0.000521 (10⁶/Re_d)^0.7, since β/Re_D is 1/Re_d.
 * @param boreReynolds Reynolds number on the bore, dimensionless
 * @returns dimensionless @throws OutOfRangeError (a RangeError) unless above 0
 * Range: Re_d above 5000; a shop's plate is less sharp, u(C) at least 1.5 %. Source: ISO 5167-2:2003, eq. 4.
 * @example thinPlateCoefficient(214000) // 0.5976
 */
export function thinPlateCoefficient(boreReynolds: number): number {
  return 0.5961 + 0.000521 * (1e6 / positive(boreReynolds, 'Reynolds number')) ** 0.7;
}

/** Expansibility of a plate: ε = 1 − (0.351 + 0.256β⁴ + 0.93β⁸)[1 − (p2/p1)^(1/κ)], κ = 1.4 for air.
 * @param beta diameter ratio, 0 (plenum wall) to 1 @param pressureAbsPa absolute pressure before the plate, Pa
 * @param pressureDropPa pressure drop over the plate, Pa
 * @returns 0..1 @throws OutOfRangeError (a RangeError) outside 0 to 0.98 for β, or a drop not between 0 and the pressure
 * Range: p2/p1 from 0.75; below it is shown by `orificeLimits`. Source: ISO 5167-2:2003, eq. 5.
 * @example expansibility(0.3004059, 100000, 1000) // 0.9974739
 */
export function expansibility(beta: number, pressureAbsPa: number, pressureDropPa: number): number {
  const b = between(beta, 0, 0.98, 'bore over duct diameter');
  const p1 = positive(pressureAbsPa, 'absolute pressure');
  const drop = between(pressureDropPa, 0, p1, 'pressure drop in Pa');
  return 1 - (0.351 + 0.256 * b ** 4 + 0.93 * b ** 8) * (1 - (1 - drop / p1) ** (1 / 1.4));
}

/** Pressure that a plate in a duct takes for good: Δω = Δp · (√(1−β⁴(1−C²)) − Cβ²)/(√(1−β⁴(1−C²)) + Cβ²).
 * @param beta diameter ratio, 0 to 1 @param coefficient discharge coefficient, dimensionless
 * @param pressureDropPa pressure drop over the plate, Pa
 * @returns Pa @throws OutOfRangeError (a RangeError) outside 0 to 0.98 for β, 0 to 1 for C, or a negative drop
 * Range: as the plate. Source: ISO 5167-2:2003, eq. 7.
 * @example permanentLossPa(0.678794, 0.61512, 17000) // 9069.5
 */
export function permanentLossPa(beta: number, coefficient: number, pressureDropPa: number): number {
  const b2 = between(beta, 0, 0.98, 'bore over duct diameter') ** 2;
  const c = between(coefficient, 0, 1, 'discharge coefficient');
  const root = Math.sqrt(1 - b2 * b2 * (1 - c * c));
  return (
    (between(pressureDropPa, 0, Number.MAX_VALUE, 'pressure drop in Pa') * (root - c * b2)) / (root + c * b2)
  );
}
