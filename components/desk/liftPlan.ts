import { PlannedLift, type DecimalMark, type LiftUnit } from '@/shared/schema/primitives';

/** A lift plan as somebody wrote it, read back: the lifts, or what is wrong with it in a sentence. */
export type ReadPlan = { lifts: PlannedLift[]; problem: string | null };

const most = 60;

/** Reads lifts divided by spaces, semicolons or lines. Each keeps its text as written. */
export function readLiftPlan(text: string, unit: LiftUnit): ReadPlan {
  const parts = text.split(/[\s;]+/).filter(Boolean);
  if (parts.length === 0) return { lifts: [], problem: 'Write at least one lift.' };
  if (parts.length > most)
    return { lifts: [], problem: `That is ${parts.length} lifts; a plan holds ${most} at most.` };
  const wrong = parts.find((part) => !PlannedLift.safeParse({ text: part, unit }).success);
  if (wrong !== undefined)
    return { lifts: [], problem: `“${wrong}” is not one number. Divide lifts by spaces.` };
  const values = parts.map((part) => Number(part.replace(',', '.')));
  const fallsAt = values.findIndex((value, at) => at > 0 && value <= (values[at - 1] ?? 0));
  if (fallsAt > 0)
    return {
      lifts: [],
      problem: `${parts[fallsAt]} does not lie above ${parts[fallsAt - 1]}. Lifts go upward.`,
    };
  return { lifts: parts.map((part) => ({ text: part, unit })), problem: null };
}

/** Lifts from one to another in equal steps, with as many decimals as the step and the ends have.
 * @returns the text of a plan, or null when these do not make one
 */
export function stepPlan(from: string, to: string, step: string, mark: DecimalMark): string | null {
  const numbers = [from, to, step].map((text) => Number(text.trim().replace(',', '.')));
  const [first = NaN, last = NaN, width = NaN] = numbers;
  if (!(first >= 0 && width > 0 && last >= first)) return null;
  const count = Math.floor((last - first) / width + 1e-6) + 1;
  if (count > most) return null;
  const decimals = Math.max(...[from, to, step].map((text) => /[.,](\d+)/.exec(text)?.[1]?.length ?? 0));
  return Array.from({ length: count }, (_, at) =>
    (first + at * width).toFixed(decimals).replace('.', mark),
  ).join(' ');
}
