import type { LiftUnit } from '@/shared/schema/primitives';
import type { Mark } from '@/shared/schema/views';

export type ColumnReading = {
  id: string;
  /** corrected figure as shown; null while it cannot be computed */
  correctedText: string | null;
  mark: Mark;
  /** a second look was kept or is still open */
  hasDoubt: boolean;
  isUsed: boolean;
};
export type ColumnRung = {
  id: string;
  liftText: string;
  liftUnit: LiftUnit;
  isSkipped: boolean;
  /** in the order they were keyed */
  readings: ColumnReading[];
};
export type RungState = {
  kind: 'empty' | 'skipped' | 'saved';
  /** the last reading in use */
  reading: ColumnReading | null;
  /** the mark that most needs a person, of all readings in use */
  mark: Mark | null;
  hasDoubt: boolean;
  usedCount: number;
};

const urgency: Mark[] = ['sent', 'onDevice', 'held', 'setAside', 'dispute'];
export const markWords: Record<Mark, string> = {
  onDevice: 'on this device',
  sent: 'sent',
  dispute: 'in dispute',
  held: 'held',
  setAside: 'set aside',
};

/** What a rung shows for all its readings together. */
export function rungState(rung: ColumnRung): RungState {
  const used = rung.readings.filter((reading) => reading.isUsed);
  const reading = used.at(-1) ?? null;
  const marks = used.map((each) => each.mark).sort((a, b) => urgency.indexOf(b) - urgency.indexOf(a));
  return {
    kind: reading ? 'saved' : rung.isSkipped ? 'skipped' : 'empty',
    reading,
    mark: marks[0] ?? null,
    hasDoubt: used.some((each) => each.hasDoubt),
    usedCount: used.length,
  };
}

/** How many rungs from the bottom stand under water: every one below the level is saved or skipped. */
export function waterLevel(rungs: ColumnRung[]): number {
  const firstEmpty = rungs.findIndex((rung) => rungState(rung).kind === 'empty');
  return firstEmpty < 0 ? rungs.length : firstEmpty;
}

/** The words of one rung: "sent", "skipped", "in dispute, doubt kept, 2 readings". */
export function rungWords(rung: ColumnRung): string {
  const state = rungState(rung);
  if (state.kind !== 'saved' || !state.mark) return state.kind === 'skipped' ? 'skipped' : 'not yet';
  return [
    markWords[state.mark],
    ...(state.hasDoubt ? ['doubt'] : []),
    ...(state.usedCount > 1 ? [`${state.usedCount} readings`] : []),
  ].join(', ');
}

/** The whole column in words, for screen readers. */
export function columnLabel(rungs: ColumnRung[]): string {
  const states = rungs.map(rungState);
  const saved = states.filter((state) => state.kind === 'saved');
  const counts = [...urgency]
    .reverse()
    .map((mark) => ({ mark, n: saved.filter((state) => state.mark === mark).length }))
    .filter(({ n }) => n > 0)
    .map(({ mark, n }) => `${n} ${markWords[mark]}`);
  const skipped = states.filter((state) => state.kind === 'skipped').length;
  const doubts = saved.filter((state) => state.hasDoubt).length;
  return [
    `${saved.length} of ${rungs.length} lifts saved`,
    ...counts,
    ...(skipped > 0 ? [`${skipped} skipped`] : []),
    ...(doubts > 0 ? [`${doubts} with a doubt`] : []),
  ].join(', ');
}
