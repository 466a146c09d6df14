import { idealFlow } from '@/shared/flow/ideal/isentropic';
import { expansibility } from '@/shared/flow/orifice/dischargeCoefficient';
import { bernoulliVelocityMPerS } from '@/shared/flow/ideal/bernoulli';

export type RootBias = {
  /** how much the root reads high for a sharp plate, as a share of the flow; below 0 when it reads low */
  plateRatio: number;
  /** the same for a nozzle, which passes every real port can be likened to */
  nozzleRatio: number;
  /** standard uncertainty as a share of the flow, signed like the bias, which is never corrected away */
  standardUncertaintyRatio: number;
};

/** How much of the incompressible flow really passes a sharp plate and a nozzle at a test pressure. */
function shares(pressureAbsPa: number, pressureDropPa: number) {
  const densityKgPerM3 = 1.2;
  const incompressible = densityKgPerM3 * bernoulliVelocityMPerS({ pressureDropPa, densityKgPerM3 });
  return {
    plate: expansibility(0, pressureAbsPa, pressureDropPa),
    nozzle: idealFlow({ pressureAbsPa, densityKgPerM3, pressureDropPa }).massFluxKgPerSM2 / incompressible,
  };
}

/** Bias of the root correction: share(p_test)/share(p_standard) − 1, between a sharp plate (ε of ISO 5167-2, β → 0) and a
 * nozzle (isentropic); taken as anywhere between both, u = √((b1² + b1·b2 + b2²)/3), its root mean square about 0.
 * @param testDropPa test pressure, Pa @param standardDropPa standard test pressure, Pa
 * @param pressureAbsPa absolute pressure at the inlet, Pa, 101325 by default
 * @returns shares of the flow, above 0 when the root reads high (scaled up)
 * @throws OutOfRangeError (a RangeError) unless both drops lie between 0 and the absolute pressure
 * Range: drops to 60 inH2O. Source: ISO 5167-2:2003 eq. 5 and Heywood app. C; a known bias left in: GUM F.2.4.5.
 * @example rootBias(2490.8891, 6974.48948) // { plateRatio: 0.01145, nozzleRatio: 0.0253 }
 */
export function rootBias(testDropPa: number, standardDropPa: number, pressureAbsPa = 101325): RootBias {
  const test = shares(pressureAbsPa, testDropPa);
  const standard = shares(pressureAbsPa, standardDropPa);
  const plateRatio = test.plate / standard.plate - 1;
  const nozzleRatio = test.nozzle / standard.nozzle - 1;
  const size = Math.sqrt((plateRatio ** 2 + plateRatio * nozzleRatio + nozzleRatio ** 2) / 3);
  return { plateRatio, nozzleRatio, standardUncertaintyRatio: Math.sign(nozzleRatio) * size };
}
