import type { ElementReading } from '@/shared/flow/element/elementFlow';
import {
  type BenchAir,
  type PlaceState,
  elementState,
  inletState,
  isAtInlet,
} from '@/shared/flow/element/inletState';
import { OutOfRangeError } from '@/shared/units/outOfRange';
import type { ChainContext, ChainReading, ChainStep, Shown } from './chainTypes';
import { elementStep } from './flowSteps';
import { readKeyedFlow, readKeyedPressurePa, readKeyedRest } from './readKeyed';
import { calibrationStep, scaleStep, zeroStep } from './readingSteps';
import type { Speech } from './speech';

const builtIn = (what: string) =>
  `The calibration was fitted without this step, so the ${what} is built into it.`;

/** Where a run through the first steps came to. */
export type Inlet = { flowM3PerS: number; pressureDropPa: number; state: PlaceState };

/** Steps 1 to 4, for a reading or for a leak: zero, scale, calibration, element, to the volume flow at the inlet of the test
 * piece, Q0 = ṁ/ρ0.
 * @param reading flow and test pressure as keyed, text and unit @param context what the bench and the session know
 * @param say the shop's units @param take is handed each step as it is done
 * @returns flow at the inlet m³/s, test pressure less its zero Pa, and the air at the inlet (Pa, K, 0..1, kg/m³)
 * @throws RangeError when what was keyed is not one number; OutOfRangeError for a figure outside a formula
 * Range: that of each step. Source: flow-maths, section 1.
 * @example toInlet({ flow: { text: '100', unit: 'L/s' }, pressure: { text: '7', unit: 'kPa' } }, { bench: { element: 'vane', place: 'room', scaledDensityKgPerM3: null, plate: null, leakExponent: 0.5, isLeakBeforeElement: true }, direction: 'drawing', range: null, zero: null, calibration: null, leak: null, room: null, plenum: null, standardPressure: { text: '7', unit: 'kPa' }, reference: { label: 'dry', densityKgPerM3: 1.2, air: referenceAir('dry20C') }, show: { flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.' } }, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 }), (step) => step) // { flowM3PerS: 0.1000, pressureDropPa: 7000 }
 */
export function toInlet(
  reading: ChainReading,
  context: ChainContext,
  say: Speech,
  take: (step: ChainStep) => void,
): Inlet {
  const { bench, calibration, zero } = context;
  const massDensity = bench.scaledDensityKgPerM3 ?? context.reference.densityKgPerM3;
  const keyed = readKeyedFlow(reading.flow, massDensity);
  take({
    name: 'reading',
    state: 'done',
    value: keyed.value,
    unit: keyed.unit,
    formula: '',
    sentence: `Keyed: ${reading.flow.text} ${reading.flow.unit} at ${reading.pressure.text} ${reading.pressure.unit}.`,
    notes: [],
  });
  const isOn = (step: 'zero' | 'element') => !calibration || calibration.stepsOn.includes(step);

  const rest = zero?.flow ? readKeyedRest(zero.flow, massDensity) : null;
  const usableRest =
    rest && rest.unit !== keyed.unit ? 'The zero is of another quantity than the reading.' : rest;
  const zeroed = zeroStep('zero', keyed, rest && !isOn('zero') ? builtIn('zero') : usableRest, say);
  take(zeroed);
  const pressureRest = zero?.pressure ? readKeyedRest(zero.pressure, massDensity) : null;
  const testPa: Shown = { unit: 'Pa', value: readKeyedPressurePa(reading.pressure) };
  const pressure = zeroStep('pressureZero', testPa, pressureRest, say);
  take(pressure);
  const air: BenchAir = {
    room: context.room ?? context.reference.air,
    plenum: context.plenum,
    direction: context.direction,
    pressureDropPa: pressure.value,
  };

  const scaled = scaleStep(zeroed, context.range, say);
  take(scaled);
  if (scaled.unit === 'Pa') {
    // a plate read as a pressure drop is a flow only after the element: its calibration is fitted on that
    const state = inletState(air);
    const through = elementOf(scaled.value, context, air, state, say);
    take(through);
    const trued = calibrationStep(through.value, calibration, say);
    take(trued);
    return { flowM3PerS: trued.value, pressureDropPa: pressure.value, state };
  }
  const trued = calibrationStep(scaled.value, calibration, say);
  take(trued);
  const state = inletState(air);
  const through = isOn('element')
    ? elementOf(trued.value, context, air, state, say)
    : skippedElement(trued.value, builtIn('element'));
  take(through);
  return { flowM3PerS: through.value, pressureDropPa: pressure.value, state };
}

function skippedElement(value: number, sentence: string): ChainStep {
  return { name: 'element', state: 'skipped', value, unit: 'm3/s', formula: '', sentence, notes: [] };
}

function elementOf(
  value: number,
  context: ChainContext,
  air: BenchAir,
  inlet: PlaceState,
  say: Speech,
): ChainStep {
  const { element, place, plate, scaledDensityKgPerM3 } = context.bench;
  if (element === 'corrected')
    return skippedElement(value, 'The bench shows flow that is corrected already.');
  let reading: ElementReading;
  if (element === 'orificeDrop') {
    if (!plate) throw new OutOfRangeError('plate', 'A pressure drop needs the dimensions of the plate.');
    reading = { element, pressureDropPa: value, plate };
  } else if (element === 'vane') reading = { element, indicatedM3PerS: value };
  else
    reading = {
      element,
      indicatedM3PerS: value,
      scaledDensityKgPerM3: scaledDensityKgPerM3 ?? context.reference.densityKgPerM3,
    };
  const at = isAtInlet(air.direction, place) ? inlet : elementState(air, place);
  const step = elementStep(reading, at, inlet, say);
  const notes: string[] = [];
  if (!context.room) notes.push(`No air was recorded: reckoned with ${context.reference.label}.`);
  if (element !== 'vane' && element !== 'orificeDrop' && scaledDensityKgPerM3 === null)
    notes.push('The bench does not say what air its element is scaled for: the reference air is taken.');
  return notes.length === 0 ? step : { ...step, notes: [...step.notes, ...notes] };
}
