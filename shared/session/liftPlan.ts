import type { DecimalMark, LiftUnit, PlannedLift } from '@/shared/schema/primitives';
import { KeyedText } from '@/shared/schema/primitives';
import { readNumber } from '@/shared/units/quantity';

const maxLiftCount = 60;

/** What came of a typed plan: the lifts, or a sentence that says what is wrong with it. */
export type PlanResult = { lifts: PlannedLift[] } | { sentence: string };

/** Lifts at equal steps: from the first, step by step, up to the last.
 * The texts keep the number of decimals that was keyed, so 0.050 to 0.600 by 0.050 reads 0.050, 0.100 … 0.600.
 */
export function liftsBySteps(
  input: { firstText: string; stepText: string; lastText: string; unit: LiftUnit },
  mark: DecimalMark,
): PlanResult {
  const texts = [input.firstText, input.stepText, input.lastText].map((text) => text.trim());
  const wrong = texts.find((text) => !KeyedText.safeParse(text).success);
  if (wrong !== undefined)
    return { sentence: wrong === '' ? 'First, step and last are needed.' : `“${wrong}” is not one number.` };
  const decimals = Math.max(...texts.map((text) => text.split(/[.,]/)[1]?.length ?? 0));
  // whole multiples of the last decimal: sums of decimals in binary drift
  const scale = 10 ** decimals;
  const [first, step, last] = texts.map((text) => Math.round(readNumber(text) * scale)) as [
    number,
    number,
    number,
  ];
  if (step === 0) return { sentence: 'The step must be above zero.' };
  if (first === 0) return { sentence: 'The first lift must be above zero.' };
  if (last < first) return { sentence: 'The last lift is below the first.' };
  const count = Math.floor((last - first) / step) + 1;
  if (count > maxLiftCount) return { sentence: `That makes ${count} lifts; ${maxLiftCount} is the most.` };
  const lifts = Array.from({ length: count }, (_, index) => ({
    text: ((first + index * step) / scale).toFixed(decimals).replace('.', mark),
    unit: input.unit,
  }));
  return { lifts };
}

/** Lifts typed one after another, separated by spaces or semicolons or new lines; commas too when the mark is a point. */
export function liftsFromList(typed: string, unit: LiftUnit, mark: DecimalMark): PlanResult {
  const texts = typed.split(mark === ',' ? /[\s;]+/ : /[\s;,]+/).filter((text) => text !== '');
  if (texts.length === 0) return { sentence: 'Type at least one lift.' };
  if (texts.length > maxLiftCount)
    return { sentence: `That is ${texts.length} lifts; ${maxLiftCount} is the most.` };
  const wrong = texts.find((text) => !KeyedText.safeParse(text).success);
  if (wrong !== undefined) return { sentence: `“${wrong}” is not one number.` };
  const zero = texts.find((text) => readNumber(text) === 0);
  if (zero !== undefined) return { sentence: 'A lift must be above zero.' };
  const double = texts.find(
    (text, index) => texts.findIndex((other) => readNumber(other) === readNumber(text)) !== index,
  );
  if (double !== undefined) return { sentence: `${double} stands in the plan twice.` };
  return { lifts: texts.map((text) => ({ text, unit })) };
}
