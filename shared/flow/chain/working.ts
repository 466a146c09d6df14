import { isAtInlet } from '@/shared/flow/element/inletState';
import { OutOfRangeError, positive } from '@/shared/units/outOfRange';
import type { ChainContext, ChainReading, ChainStep, Working } from './chainTypes';
import { airStep, leakStep, testPressureStep } from './flowSteps';
import { readKeyedPressurePa } from './readKeyed';
import { type Speech, silence, speech } from './speech';
import { type Inlet, toInlet } from './toInlet';

/** Thrown inside the chain by a step that cannot go on; `working` turns it into its last step. */
class Stopped extends Error {}

const noAir = 'No air was recorded: not brought to the reference air. The uncertainty grows.';

/** What the leak step takes: the leak brought through steps 1 to 4, or why none is subtracted. */
function leakOf(context: ChainContext): Parameters<typeof leakStep>[2] {
  const { leak, bench } = context;
  if (!leak) return null;
  if (!bench.isLeakBeforeElement) return 'The leak does not pass the element: it is not subtracted.';
  const { flowM3PerS, pressureDropPa } = toInlet(leak.reading, context, silence, (step) => {
    if (step.state === 'stopped') throw new OutOfRangeError('leak', `The leak: ${step.sentence}`);
  });
  const exponent = bench.leakExponent;
  return { flowM3PerS, pressureDropPa, exponent, settingRatio: leak.settingRatio };
}

function stopAtStopped(step: ChainStep): void {
  if (step.state === 'stopped') throw new Stopped(step.sentence);
}

/** The working of one reading: zero → scale → calibration → element → leak → test pressure → air, every input, formula and
 * intermediate figure, and what was skipped and why. Q_ref = ṁ/√(ρ0 ρref)·√(p_standard/p_test).
 * @param reading flow and test pressure as keyed, text and unit
 * @param context bench, direction, range, zeros, calibration, leak, air, standard pressure, reference air, the shop's units
 * @returns steps with values in SI and sentences in the shop's units; corrected and unscaled flow, m³/s; null and a last step
 * that says why when the chain cannot go on (no test pressure, no range, a figure outside a formula)
 * @throws RangeError when what was keyed is not exactly one number
 * Range: that of each step. Source: flow-maths, section 1.
 * @example working({ flow: { text: '100', unit: 'cfm' }, pressure: { text: '0', unit: 'inH2O' } }, { bench: { element: 'vane', place: 'room', scaledDensityKgPerM3: null, plate: null, leakExponent: 0.5, isLeakBeforeElement: true }, direction: 'drawing', range: null, zero: null, calibration: null, leak: null, room: null, plenum: null, standardPressure: { text: '28', unit: 'inH2O' }, reference: { label: 'dry', densityKgPerM3: 1.2, air: referenceAir('dry20C') }, show: { flowUnit: 'cfm', pressureUnit: 'inH2O', decimalMark: '.' } }) // { flowM3PerS: null }
 */
export function working(reading: ChainReading, context: ChainContext): Working {
  return chained(
    reading,
    context,
    speech({ ...context.show, densityKgPerM3: context.reference.densityKgPerM3 }),
  );
}

/** What `working` comes to, without its sentences: for curves, figures and sessions, where hundreds are wanted at once.
 * Q_ref = ṁ/√(ρ0 ρref)·√(p_standard/p_test).
 * @param reading flow and test pressure as keyed, text and unit @param context as for `working`
 * @returns corrected and unscaled flow, m³/s, null when the chain cannot go on, and the notes
 * @throws RangeError when what was keyed is not exactly one number
 * Range: that of each step. Source: flow-maths, section 1.
 * @example correctedFlow({ flow: { text: '100', unit: 'L/s' }, pressure: { text: '2.5', unit: 'kPa' } }, { bench: { element: 'vane', place: 'room', scaledDensityKgPerM3: null, plate: null, leakExponent: 0.5, isLeakBeforeElement: true }, direction: 'drawing', range: null, zero: null, calibration: null, leak: null, room: null, plenum: null, standardPressure: { text: '10', unit: 'kPa' }, reference: { label: 'dry', densityKgPerM3: 1.2, air: referenceAir('dry20C') }, show: { flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.' } }) // { flowM3PerS: 0.2000, isAirAssumed: true }
 */
export function correctedFlow(reading: ChainReading, context: ChainContext): Omit<Working, 'steps'> {
  const { flowM3PerS, unscaled, isAirAssumed, notes } = chained(reading, context, silence);
  return { flowM3PerS, unscaled, isAirAssumed, notes };
}

function chained(reading: ChainReading, context: ChainContext, say: Speech): Working {
  const steps: ChainStep[] = [];
  const take = (step: ChainStep) => {
    steps.push(step);
    stopAtStopped(step);
  };
  let unscaled: Working['unscaled'] = null;
  let flowM3PerS: number | null = null;
  try {
    const inlet = toInlet(reading, context, say, take);
    const standardPa = positive(readKeyedPressurePa(context.standardPressure), 'standard test pressure');
    const ends =
      context.bench.element === 'corrected'
        ? correctedEnd(inlet, standardPa, context, say, take)
        : measuredEnd(inlet, standardPa, context, say, take);
    ({ unscaled, flowM3PerS } = ends);
  } catch (error) {
    if (!(error instanceof OutOfRangeError || error instanceof Stopped)) throw error;
    if (error instanceof OutOfRangeError) steps.push(stopped(steps, error.message));
  }
  return {
    steps,
    flowM3PerS,
    unscaled,
    isAirAssumed: context.room === null,
    notes: [...new Set(steps.flatMap(({ notes }) => notes))],
  };
}

const order = [
  'reading',
  'zero',
  'pressureZero',
  'scale',
  'calibration',
  'element',
  'leak',
  'testPressure',
  'air',
] as const;

/** The step that a figure outside a formula stopped: the one after the last that was taken. */
function stopped(steps: ChainStep[], sentence: string): ChainStep {
  const last = steps.at(-1);
  const name = order[last ? order.indexOf(last.name) + 1 : 0] ?? 'air';
  return {
    name,
    state: 'stopped',
    value: last?.value ?? 0,
    unit: last?.unit ?? 'm3/s',
    formula: '',
    sentence,
    notes: [sentence],
  };
}

type End = { flowM3PerS: number; unscaled: Working['unscaled'] };

function measuredEnd(
  inlet: Inlet,
  standardPa: number,
  context: ChainContext,
  say: Speech,
  take: (step: ChainStep) => void,
): End {
  const { pressureDropPa, state } = inlet;
  if (pressureDropPa <= 0)
    throw new OutOfRangeError('test pressure', 'At a test pressure of zero there is nothing to correct by.');
  const afterLeak = leakStep(inlet.flowM3PerS, pressureDropPa, leakOf(context), say);
  take(afterLeak);
  const scaled = testPressureStep(afterLeak.value, pressureDropPa, standardPa, say);
  take(scaled);
  const { element, place } = context.bench;
  const cancels = (element === 'orificeFlow' || element === 'pitot') && isAtInlet(context.direction, place);
  const last = airStep(
    scaled.value,
    context.room ? state.densityKgPerM3 : noAir,
    context.reference,
    cancels,
    say,
  );
  take(state.notes.length === 0 ? last : { ...last, notes: [...last.notes, ...state.notes] });
  return {
    flowM3PerS: last.value,
    unscaled: {
      flowM3PerS: afterLeak.value,
      pressureDropPa,
      pressureAbsPa: state.pressureAbsPa,
      densityKgPerM3: state.densityKgPerM3,
    },
  };
}

/** The end of the chain for a bench that shows flow at the standard pressure and the reference air already. Its leak has
 * been scaled by the root as well, which leaves (p/p_leak)^(n − ½). */
function correctedEnd(
  inlet: Inlet,
  standardPa: number,
  context: ChainContext,
  say: Speech,
  take: (step: ChainStep) => void,
): End {
  const { pressureDropPa, state } = inlet;
  if (pressureDropPa <= 0)
    throw new OutOfRangeError('test pressure', 'At a test pressure of zero there is nothing to correct by.');
  const back =
    Math.sqrt(pressureDropPa / standardPa) *
    Math.sqrt(context.reference.densityKgPerM3 / state.densityKgPerM3);
  const leak = leakOf(context);
  const asShown =
    leak === null || typeof leak === 'string'
      ? leak
      : { ...leak, flowM3PerS: leak.flowM3PerS * Math.sqrt(leak.pressureDropPa / pressureDropPa) };
  const afterLeak = leakStep(inlet.flowM3PerS, pressureDropPa, asShown, say);
  take(afterLeak);
  const already = 'The bench shows flow that is corrected already.';
  for (const name of ['testPressure', 'air'] as const)
    take({
      name,
      state: 'skipped',
      value: afterLeak.value,
      unit: 'm3/s',
      formula: '',
      sentence: already,
      notes: [],
    });
  return {
    flowM3PerS: afterLeak.value,
    unscaled: {
      flowM3PerS: afterLeak.value * back,
      pressureDropPa,
      pressureAbsPa: state.pressureAbsPa,
      densityKgPerM3: state.densityKgPerM3,
    },
  };
}
