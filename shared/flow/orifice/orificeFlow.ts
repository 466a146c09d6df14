import { viscosityPaS } from '@/shared/flow/air/dryAir';
import { OutOfRangeError, between, positive } from '@/shared/units/outOfRange';
import {
  type DuctPlate,
  diameterRatio,
  expansibility,
  orificeCoefficient,
  thinPlateCoefficient,
} from './dischargeCoefficient';
import { orificeLimits } from './orificeLimits';

/** Air before the plate and the drop over it. */
export type PlateState = {
  pressureAbsPa: number;
  densityKgPerM3: number;
  temperatureK: number;
  pressureDropPa: number;
};

export type PlateFlow = {
  massKgPerS: number;
  /** volume flow at the state before the plate, m³/s */
  flowM3PerS: number;
  coefficient: number;
  expansibilityRatio: number;
  /** on the duct, or on the bore for a plate in a plenum wall */
  reynolds: number;
  /** sentences: limits of use that are left; empty inside them */
  limits: string[];
};

const steps = 200;
const smallestKgPerS = 1e-100;

/** Solves for the mass flow: the coefficient depends on the Reynolds number, that on the flow. */
function iterate(
  diameterM: number,
  viscosity: number,
  start: number,
  next: (reynolds: number) => number,
): { massKgPerS: number; reynolds: number } {
  // below this a square or a quotient of it loses its digits, and 0 / 0 would be no number
  if (!(start > smallestKgPerS)) throw tooSmall();
  let massKgPerS = start;
  for (let i = 0; i < steps; i += 1) {
    const reynolds = (4 * massKgPerS) / (Math.PI * diameterM * viscosity);
    const better = next(reynolds);
    if (Math.abs(better - massKgPerS) <= 1e-14 * better) return { massKgPerS: better, reynolds };
    massKgPerS = better;
  }
  throw tooSmall();
}

const tooSmall = () =>
  new OutOfRangeError('flow', 'The flow through this plate is too small to be computed.');

function positiveState(state: PlateState): PlateState {
  positive(state.densityKgPerM3, 'density of the air');
  positive(state.pressureDropPa, 'pressure drop');
  between(state.pressureDropPa, 0, positive(state.pressureAbsPa, 'absolute pressure'), 'pressure drop in Pa');
  return state;
}

/** Flow through a plate in a duct: qm = C/√(1−β⁴) · ε · (π/4)d² · √(2 Δp ρ1), iterated on Re = 4 qm/(π D μ).
 * @param plate.ductDiameterM duct, m @param plate.boreM bore, m @param plate.tappings where the pressure is taken
 * @param state.pressureAbsPa absolute pressure before the plate, Pa @param state.densityKgPerM3 density there, kg/m³
 * @param state.temperatureK temperature there, K @param state.pressureDropPa drop over the plate, Pa
 * @returns mass flow kg/s, volume flow before the plate m³/s, C, ε, Re (dimensionless) and limits of use left (flagged)
 * @throws OutOfRangeError (a RangeError) unless all are above 0, d < 0.98 D and the drop is below the pressure
 * Range: limits of use are flagged, not enforced. Source: ISO 5167-2:2003, eq. 1, 4, 5 and annex A of ISO 5167-1.
 * @example ductPlateFlow({ ductDiameterM: 0.1, boreM: 0.06, tappings: 'corner' }, { pressureAbsPa: 101325, densityKgPerM3: 1.20410543, temperatureK: 293.15, pressureDropPa: 1494.53346 }) // { massKgPerS: 0.110676, coefficient: 0.611305 }
 */
export function ductPlateFlow(plate: DuctPlate, state: PlateState): PlateFlow {
  const beta = diameterRatio(plate);
  const { pressureAbsPa, densityKgPerM3, pressureDropPa, temperatureK } = positiveState(state);
  const expansibilityRatio = expansibility(beta, pressureAbsPa, pressureDropPa);
  const perCoefficient =
    (((expansibilityRatio / Math.sqrt(1 - beta ** 4)) * Math.PI) / 4) *
    plate.boreM ** 2 *
    Math.sqrt(2 * pressureDropPa * densityKgPerM3);
  const { massKgPerS, reynolds } = iterate(
    plate.ductDiameterM,
    viscosityPaS(temperatureK),
    0.6 * perCoefficient,
    (re) => orificeCoefficient(plate, re) * perCoefficient,
  );
  return {
    massKgPerS,
    flowM3PerS: massKgPerS / densityKgPerM3,
    coefficient: massKgPerS / perCoefficient,
    expansibilityRatio,
    reynolds,
    limits: orificeLimits(plate, reynolds, 1 - pressureDropPa / pressureAbsPa),
  };
}

/** A plate in the wall of a plenum: its bore, and its coefficient when that is known (0.60 by practice, or the plate's
 * own); null computes it for a truly sharp edge. */
export type WallPlate = { boreM: number; coefficient: number | null };

/** Flow through a thin plate in a plenum wall (β → 0): qm = C · ε · (π/4)d² · √(2 Δp ρ1), with a given C, or iterated on
 * Re_d for a truly sharp edge.
 * @param plate.boreM bore, m @param plate.coefficient discharge coefficient, dimensionless; null for a sharp edge
 * @param state.pressureAbsPa absolute pressure before the plate, Pa @param state.densityKgPerM3 density there, kg/m³
 * @param state.temperatureK temperature there, K @param state.pressureDropPa drop over the plate, Pa
 * @returns mass flow kg/s, volume flow before the plate m³/s, C, ε, Re_d (dimensionless) and limits of use left (flagged)
 * @throws OutOfRangeError (a RangeError) unless all are above 0 and the drop is below the pressure
 * Range: sharp side upstream, plate thinner than a fiftieth of the bore; limits flagged. u(C) at least 1.5 % for shop plates.
 * Source: ISO 5167-2:2003, eq. 1, 4 and 5 for β → 0; C = 0.60 is common practice of the trade.
 * @example wallPlateFlow({ boreM: 0.0508, coefficient: 0.6 }, { pressureAbsPa: 101325, densityKgPerM3: 1.20410543, temperatureK: 293.15, pressureDropPa: 6974.48948 }) // { flowM3PerS: 0.12860860 }
 */
export function wallPlateFlow(plate: WallPlate, state: PlateState): PlateFlow {
  const bore = positive(plate.boreM, 'bore of the plate');
  const { pressureAbsPa, densityKgPerM3, pressureDropPa, temperatureK } = positiveState(state);
  const expansibilityRatio = expansibility(0, pressureAbsPa, pressureDropPa);
  const perCoefficient =
    ((expansibilityRatio * Math.PI) / 4) * bore ** 2 * Math.sqrt(2 * pressureDropPa * densityKgPerM3);
  const given = plate.coefficient === null ? null : positive(plate.coefficient, 'discharge coefficient');
  const { massKgPerS, reynolds } = iterate(
    bore,
    viscosityPaS(temperatureK),
    0.6 * perCoefficient,
    (re) => perCoefficient * (given ?? thinPlateCoefficient(re)),
  );
  const limits: string[] = [];
  if (bore < 0.0125) limits.push('The bore is below 12.5 mm, the smallest the standard covers.');
  if (reynolds < 5000) limits.push('The flow is too slow for the standard: Reynolds number below 5000.');
  if (pressureDropPa / pressureAbsPa > 0.25)
    limits.push('The plate drops more than a quarter of the pressure: expansibility is beyond its range.');
  return {
    massKgPerS,
    flowM3PerS: massKgPerS / densityKgPerM3,
    coefficient: massKgPerS / perCoefficient,
    expansibilityRatio,
    reynolds,
    limits,
  };
}
