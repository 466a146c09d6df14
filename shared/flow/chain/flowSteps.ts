import {
  type ElementReading,
  elementMass,
  inletFlowM3PerS,
  toReferenceAirM3PerS,
} from '@/shared/flow/element/elementFlow';
import type { PlaceState } from '@/shared/flow/element/inletState';
import { leakAtM3PerS } from '@/shared/flow/element/leak';
import { rootToStandardPressure } from '@/shared/flow/correctReading';
import { zeroOrMore } from '@/shared/units/outOfRange';
import type { ChainStep } from './chainTypes';
import type { Speech } from './speech';

const elementFormula: Record<ElementReading['element'], string> = {
  vane: 'ṁ = ind · ρe, Q0 = ṁ/ρ0',
  hotWire: 'ṁ = ind · ρstd, Q0 = ṁ/ρ0',
  pitot: 'ṁ = ind · √(ρcal · ρe), Q0 = ṁ/ρ0',
  orificeFlow: 'ṁ = ind · √(ρcal · ρe), Q0 = ṁ/ρ0',
  orificeDrop: 'ṁ by ISO 5167-2, Q0 = ṁ/ρ0',
};

/** Step 4, element: mass flow by what the element reads, then volume at the inlet, Q0 = ṁ/ρ0.
 * @param reading what the element shows: m³/s with the density it is scaled for, kg/m³, or a plate and its drop, Pa
 * @param at air at the element: Pa, K, kg/m³ @param inlet air at the inlet of the test piece: Pa, K, kg/m³
 * @param say the shop's units
 * @returns step with the value in m³/s at the inlet state @throws OutOfRangeError (a RangeError) where `elementMass` does
 * Range: as the element; limits of use of a plate and of the density are noted. Source: flow-maths, section 1, step 4.
 * @example elementStep({ element: 'hotWire', indicatedM3PerS: 0.1, scaledDensityKgPerM3: 1.2 }, { pressureAbsPa: 1e5, temperatureK: 293.15, humidityRatio: 0, densityKgPerM3: 1.1, notes: [] }, { pressureAbsPa: 1e5, temperatureK: 293.15, humidityRatio: 0, densityKgPerM3: 1.1, notes: [] }, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 })) // { value: 0.109091 }
 */
export function elementStep(
  reading: ElementReading,
  at: PlaceState,
  inlet: PlaceState,
  say: Speech,
): ChainStep {
  const { massKgPerS, limits } = elementMass(reading, at);
  const value = inletFlowM3PerS(massKgPerS, inlet.densityKgPerM3);
  return {
    name: 'element',
    state: 'done',
    value,
    unit: 'm3/s',
    formula: elementFormula[reading.element],
    sentence: `Air ${say.density(at.densityKgPerM3)} at the element, ${say.density(inlet.densityKgPerM3)} at the inlet of the port: ${say.flow(value)} there.`,
    notes:
      at === inlet ? [...inlet.notes, ...limits] : [...new Set([...inlet.notes, ...at.notes, ...limits])],
  };
}

/** Step 5, leak: Q = Q0 − Q_leak·(setting)·(p/p_leak)ⁿ, only when the leak enters between test piece and element.
 * @param flowM3PerS flow at the inlet state, m³/s @param pressureDropPa test pressure, Pa
 * @param leak leak taken through the steps before, m³/s, its pressure Pa, exponent and ratio of settings; a sentence why it
 * is not subtracted; null when none was measured
 * @param say the shop's units
 * @returns step with the value in m³/s, not below 0 @throws OutOfRangeError (a RangeError) where `leakAtM3PerS` does
 * Range: as `leakAtM3PerS`; a leak above the flow is noted. Source: flow-maths, section 1, step 5.
 * @example leakStep(0.1, 1750, { flowM3PerS: 0.002, pressureDropPa: 7000, exponent: 0.5, settingRatio: 1 }, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 })) // { value: 0.0990 }
 */
export function leakStep(
  flowM3PerS: number,
  pressureDropPa: number,
  leak: Parameters<typeof leakAtM3PerS>[0] | string | null,
  say: Speech,
): ChainStep {
  const flow = zeroOrMore(flowM3PerS, 'flow');
  const formula = 'Q = Q0 − leak · (p/p_leak)ⁿ';
  if (leak === null || typeof leak === 'string') {
    const sentence = leak ?? 'No leak was measured: none is subtracted.';
    const said = leak === null ? [sentence] : [];
    return { name: 'leak', state: 'skipped', value: flow, unit: 'm3/s', formula, sentence, notes: said };
  }
  const atPressure = leakAtM3PerS(leak, pressureDropPa);
  const value = Math.max(0, flow - atPressure);
  const sentence = `Less the leak, ${say.flow(atPressure)} at ${say.pressure(pressureDropPa)}: ${say.flow(value)}.`;
  const notes = atPressure > flow ? ['The leak is larger than the flow.'] : [];
  return { name: 'leak', state: 'done', value, unit: 'm3/s', formula, sentence, notes };
}

/** Step 6, test pressure: Q = Q_test·√(p_standard/p_test).
 * @param flowM3PerS flow at the test pressure, m³/s @param testDropPa test pressure, Pa @param standardDropPa standard, Pa
 * @param say the shop's units
 * @returns step with the value in m³/s @throws RangeError unless both pressures are above 0
 * Range: scaled up it reads high (to 28 from 10 inH2O by 1.1 to 2.5 %); never corrected away, it enters the uncertainty.
 * Source: common practice of the trade; Bernoulli.
 * @example testPressureStep(0.1, 2500, 10000, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 })) // { value: 0.20 }
 */
export function testPressureStep(
  flowM3PerS: number,
  testDropPa: number,
  standardDropPa: number,
  say: Speech,
): ChainStep {
  const value = rootToStandardPressure(flowM3PerS, testDropPa, standardDropPa);
  const root = say.number(Math.sqrt(standardDropPa / testDropPa), 4);
  return {
    name: 'testPressure',
    state: 'done',
    value,
    unit: 'm3/s',
    formula: 'Q = Q_test · √(p_standard/p_test)',
    sentence: `From ${say.pressure(testDropPa)} to ${say.pressure(standardDropPa)} by the square root, × ${root}: ${say.flow(value)}.`,
    notes: standardDropPa > 1.02 * testDropPa ? ['Scaled up by the root, which reads a little high.'] : [],
  };
}

/** Step 7, air: Q = Q·√(ρ0/ρref), to the reference air.
 * @param flowM3PerS flow at the inlet state, m³/s @param inletDensityKgPerM3 density there, kg/m³; a sentence when no air was
 * recorded @param reference label and density (kg/m³) of the reference air
 * @param cancels true when a scaled orifice or pitot sits in the same air as the port, so that the room's air cancels
 * @param say the shop's units
 * @returns step with the value in m³/s @throws OutOfRangeError (a RangeError) for densities not above 0
 * Range: as the densities. Source: Bernoulli at equal pressure drop.
 * @example airStep(0.1, 1.1, { label: 'dry', densityKgPerM3: 1.2 }, false, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 })) // { value: 0.0957427 }
 */
export function airStep(
  flowM3PerS: number,
  inletDensityKgPerM3: number | string,
  reference: { label: string; densityKgPerM3: number },
  cancels: boolean,
  say: Speech,
): ChainStep {
  const formula = 'Q = Q · √(ρ0/ρref)';
  if (typeof inletDensityKgPerM3 === 'string') {
    const sentence = inletDensityKgPerM3;
    const flow = zeroOrMore(flowM3PerS, 'flow');
    return { name: 'air', state: 'skipped', value: flow, unit: 'm3/s', formula, sentence, notes: [sentence] };
  }
  const value = toReferenceAirM3PerS(flowM3PerS, inletDensityKgPerM3, reference.densityKgPerM3);
  const factor = say.number(Math.sqrt(inletDensityKgPerM3 / reference.densityKgPerM3), 4);
  const cancelled = cancels
    ? ' The element sits in the same air as the port, so the room’s air cancels.'
    : '';
  const sentence = `To ${reference.label} (${say.density(reference.densityKgPerM3)}) from ${say.density(inletDensityKgPerM3)}, × ${factor}: ${say.flow(value)}.${cancelled}`;
  return { name: 'air', state: 'done', value, unit: 'm3/s', formula, sentence, notes: [] };
}
