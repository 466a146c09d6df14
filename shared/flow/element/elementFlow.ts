import { type DuctPlate } from '@/shared/flow/orifice/dischargeCoefficient';
import { type WallPlate, ductPlateFlow, wallPlateFlow } from '@/shared/flow/orifice/orificeFlow';
import { positive, zeroOrMore } from '@/shared/units/outOfRange';
import { type PlaceState } from './inletState';

/** What a flow element showed, after zero, scale and calibration. `scaledDensityKgPerM3` is the density the instrument was
 * scaled for: a hot wire's own standard density, an orifice's or pitot tube's calibration density. */
export type ElementReading =
  | { element: 'vane'; indicatedM3PerS: number }
  | { element: 'hotWire' | 'pitot' | 'orificeFlow'; indicatedM3PerS: number; scaledDensityKgPerM3: number }
  | { element: 'orificeDrop'; pressureDropPa: number; plate: DuctPlate | WallPlate };

export type ElementMass = {
  massKgPerS: number;
  /** limits of use that a plate leaves; none for other elements */
  limits: string[];
};

/** Mass flow of an element: vane (reads volume) ṁ = ind·ρe; hot wire (reads mass flux) ṁ = ind·ρstd; orifice or pitot scaled
 * in flow ṁ = ind·√(ρcal·ρe); orifice read as a pressure drop by ISO 5167-2 with p1 at the plate.
 * @param reading.element kind of element @param reading.indicatedM3PerS indicated flow, m³/s
 * @param reading.scaledDensityKgPerM3 density the instrument is scaled for, kg/m³
 * @param reading.pressureDropPa drop over the plate, Pa @param reading.plate the plate, lengths in m
 * @param state air at the element: pressure Pa, temperature K, density kg/m³
 * @returns mass flow kg/s, and limits of use left (flagged) @throws OutOfRangeError (a RangeError) for flows below 0, densities
 * not above 0, or a plate that is none
 * Range: a vane below its starting speed shows 0, which means "below what this bench can see".
 * Source: flow-maths, section 1, step 4; ISO 5167-2:2003.
 * @example elementMass({ element: 'vane', indicatedM3PerS: 0.1 }, { pressureAbsPa: 1e5, temperatureK: 293.15, humidityRatio: 0, densityKgPerM3: 1.19, notes: [] }) // { massKgPerS: 0.1190, limits: [] }
 */
export function elementMass(reading: ElementReading, state: PlaceState): ElementMass {
  const density = positive(state.densityKgPerM3, 'density of the air');
  if (reading.element === 'orificeDrop') return plateMass(reading, state);
  const indicated = zeroOrMore(reading.indicatedM3PerS, 'indicated flow');
  if (reading.element === 'vane') return { massKgPerS: indicated * density, limits: [] };
  const scaled = positive(reading.scaledDensityKgPerM3, 'density the instrument is scaled for');
  const factor = reading.element === 'hotWire' ? scaled : Math.sqrt(scaled * density);
  return { massKgPerS: indicated * factor, limits: [] };
}

function plateMass(reading: ElementReading & { element: 'orificeDrop' }, state: PlaceState): ElementMass {
  if (zeroOrMore(reading.pressureDropPa, 'pressure drop') === 0) return { massKgPerS: 0, limits: [] };
  const before = { ...state, pressureDropPa: reading.pressureDropPa };
  const { massKgPerS, limits } =
    'tappings' in reading.plate ? ductPlateFlow(reading.plate, before) : wallPlateFlow(reading.plate, before);
  return { massKgPerS, limits };
}

/** Volume flow at the inlet of the test piece: Q0 = ṁ / ρ0.
 * @param massKgPerS mass flow, kg/s @param inletDensityKgPerM3 density at the inlet of the test piece, kg/m³
 * @returns m³/s @throws OutOfRangeError (a RangeError) for a flow below 0 or a density not above 0
 * Range: 0 on. Source: flow-maths, section 1, step 4.
 * @example inletFlowM3PerS(0.12, 1.2) // 0.10
 */
export function inletFlowM3PerS(massKgPerS: number, inletDensityKgPerM3: number): number {
  return zeroOrMore(massKgPerS, 'mass flow') / positive(inletDensityKgPerM3, 'density of the air');
}

/** Flow brought to the reference air: Q_ref = ṁ / √(ρ0 ρref), which is Q0 √(ρ0/ρref).
 * @param flowM3PerS flow at the inlet state, m³/s @param inletDensityKgPerM3 density there, kg/m³
 * @param referenceDensityKgPerM3 density of the reference air, kg/m³
 * @returns m³/s @throws OutOfRangeError (a RangeError) for a flow below 0 or densities not above 0
 * Range: 0 on. Source: Bernoulli at equal pressure drop.
 * @example toReferenceAirM3PerS(0.1, 1.1, 1.2) // 0.0957427
 */
export function toReferenceAirM3PerS(
  flowM3PerS: number,
  inletDensityKgPerM3: number,
  referenceDensityKgPerM3: number,
): number {
  const share =
    positive(inletDensityKgPerM3, 'density of the air') /
    positive(referenceDensityKgPerM3, 'reference density');
  return zeroOrMore(flowM3PerS, 'flow') * Math.sqrt(share);
}
