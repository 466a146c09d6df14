import { calibrated } from '@/shared/flow/element/calibrate';
import { fullScaleFlowM3PerS } from '@/shared/flow/element/scale';
import { finite } from '@/shared/units/outOfRange';
import type { ChainContext, ChainStep, Shown } from './chainTypes';
import type { Speech } from './speech';

/* Steps are written as whole literals: spreading a base object costs ten times the step itself, on every reading. */

function said(shown: Shown, say: Speech): string {
  if (shown.unit === 'm3/s') return say.flow(shown.value);
  return shown.unit === 'Pa' ? say.pressure(shown.value) : `${say.number(100 * shown.value, 2)} %`;
}

/** Step 1, zero: value = shown − at rest, in the instrument's own quantity, before any root; never below 0.
 * @param name zero for the flow, pressureZero for the test pressure @param shown what it shows, m³/s, Pa or share 0..1
 * @param atRest what it shows at rest, same unit, signed; null when it was not looked at, or a sentence why it is not used
 * @param say the shop's units
 * @returns step with the value in the unit of `shown` @throws OutOfRangeError (a RangeError) unless both are finite numbers
 * Range: shown at rest or above; below it the value is 0 and noted. Source: flow-maths, section 1, step 1.
 * @example zeroStep('zero', { unit: 'm3/s', value: 0.1 }, { unit: 'm3/s', value: 0.002 }, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 })) // { value: 0.0980, state: "done" }
 */
export function zeroStep(
  name: 'zero' | 'pressureZero',
  shown: Shown,
  atRest: Shown | string | null,
  say: Speech,
): ChainStep {
  const what = name === 'zero' ? 'flow' : 'test pressure';
  const value = finite(shown.value, what);
  const formula = 'value = shown − at rest';
  const { unit } = shown;
  if (atRest === null || typeof atRest === 'string') {
    const sentence = atRest ?? `No zero of the ${what} was noted: taken as it stands.`;
    return { name, state: 'skipped', value, unit, formula, sentence, notes: [] };
  }
  const left = value - finite(atRest.value, `zero of the ${what}`);
  const after: Shown = { unit, value: Math.max(0, left) };
  const sentence = `Less ${said(atRest, say)} at rest: ${said(after, say)}.`;
  const notes = left < 0 ? [`The ${what} lies below what the instrument shows at rest.`] : [];
  return { name, state: 'done', value: after.value, unit, formula, sentence, notes };
}

/** Step 2, scale: percent of full scale, Q = Q_fs·x or Q_fs·√x. A flow or a pressure drop needs no scale.
 * @param shown after the zero, m³/s, Pa or share 0..1 @param range full scale m³/s and law; null when none was chosen
 * @param say the shop's units
 * @returns step with a value in m³/s, or Pa for a plate's drop
 * @throws OutOfRangeError (a RangeError) for a share outside 0 to 1.5; a share without a range stops the chain, flagged
 * Range: shares to 1.5. Source: flow-maths, section 1, step 2.
 * @example scaleStep({ unit: 'share', value: 0.5 }, { fullScaleM3PerS: 0.2, law: 'linear' }, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 })) // { value: 0.10, unit: "m3/s" }
 */
export function scaleStep(shown: Shown, range: ChainContext['range'], say: Speech): ChainStep {
  const value = finite(shown.value, 'reading');
  if (shown.unit !== 'share') {
    const sentence =
      shown.unit === 'Pa' ? 'A pressure drop needs no scale.' : 'It shows flow: no scale to apply.';
    return { name: 'scale', state: 'skipped', value, unit: shown.unit, formula: '', sentence, notes: [] };
  }
  if (!range) {
    const sentence = 'A percentage needs the range it was read on; none was noted.';
    return {
      name: 'scale',
      state: 'stopped',
      value,
      unit: 'share',
      formula: '',
      sentence,
      notes: [sentence],
    };
  }
  const flow = fullScaleFlowM3PerS({ openRatio: value, ...range });
  const root = range.law === 'root';
  return {
    name: 'scale',
    state: 'done',
    value: flow,
    unit: 'm3/s',
    formula: root ? 'Q = full scale · √share' : 'Q = full scale · share',
    sentence: `${say.number(100 * value, 2)} % of ${say.flow(range.fullScaleM3PerS)}${root ? ', by the root' : ''}: ${say.flow(flow)}.`,
    notes: value > 1 ? ['The reading lies above full scale.'] : [],
  };
}

/** Step 3, calibration: Q = f·ind with the factor, line or table of the bench, clamped at the ends of its range.
 * @param indicatedM3PerS flow it was fitted on, m³/s
 * @param calibration model, range (m³/s), grade and steps that were on; null when the bench has none
 * @param say the shop's units
 * @returns step with the value in m³/s @throws OutOfRangeError (a RangeError) where `calibrated` does
 * Range: its calibrated range; outside it is noted. Source: flow-maths, section 1, step 3.
 * @example calibrationStep(0.1, null, speech({ flowUnit: 'L/s', pressureUnit: 'kPa', decimalMark: '.', densityKgPerM3: 1.2 })) // { value: 0.1, state: "skipped" }
 */
export function calibrationStep(
  indicatedM3PerS: number,
  calibration: ChainContext['calibration'],
  say: Speech,
): ChainStep {
  const formula = 'Q = factor · indicated';
  if (!calibration) {
    const sentence = 'No calibration of this bench in this direction: the reading is taken as it stands.';
    const notes = ['No calibration.'];
    return {
      name: 'calibration',
      state: 'skipped',
      value: indicatedM3PerS,
      unit: 'm3/s',
      formula,
      sentence,
      notes,
    };
  }
  const { flowM3PerS: value, outside } = calibrated(calibration.model, calibration.range, indicatedM3PerS);
  const factor = say.number(indicatedM3PerS > 0 ? value / indicatedM3PerS : 1, 4);
  const sentence = `Times ${factor} by the bench’s calibration (${calibration.grade}): ${say.flow(value)}.`;
  const notes = outside
    ? [`Outside the calibrated range: ${outside} it, the factor of its end is taken.`]
    : [];
  return { name: 'calibration', state: 'done', value, unit: 'm3/s', formula, sentence, notes };
}
