import type { ColumnRung } from '@/components/column/rungState';
import { correctReading, type CorrectedReading } from '@/shared/flow/correctReading';
import type { ReadingRow, RunView, SessionView } from '@/shared/schema/views';
import { chipWord } from './words';

/** One line of a run's table. */
export type RunTableRow = {
  reading: ReadingRow;
  /** the flow at the standard test pressure; null when the reading cannot be corrected */
  corrected: CorrectedReading | null;
  /** everything noted about it, in words */
  notes: string[];
  keyedBy: string;
};

/** The readings of a run as a table shows them, in the order they were keyed. */
export function readingRows(view: RunView, session: SessionView): RunTableRow[] {
  const names = new Map(session.people.map((person) => [person.id, person.name]));
  const pulls = new Map<string, number>();
  return view.readings.map((reading) => {
    const place = reading.rungId ?? `${reading.liftText} ${reading.liftUnit}`;
    const pullOrdinal = (pulls.get(place) ?? 0) + 1;
    pulls.set(place, pullOrdinal);
    return {
      reading,
      corrected: correctReading(reading, session.session.settings, view.run.direction),
      notes: notesOf(reading, pullOrdinal),
      keyedBy: names.get(reading.byPersonId) ?? 'no longer in this shop',
    };
  });
}

function notesOf(reading: ReadingRow, pullOrdinal: number): string[] {
  const notes: string[] = [];
  if (!reading.isUsed) notes.push(reading.notUsedWhy ? `not used: ${reading.notUsedWhy}` : 'not used');
  if (pullOrdinal > 1) notes.push(`repeat ${pullOrdinal - 1}`);
  if (reading.isPressureRepeated) notes.push('pressure by key');
  if (reading.secondLook === 'doubted') notes.push('doubted');
  if (reading.secondLook === 'kept') notes.push('doubt kept');
  return [...notes, ...reading.chips.map(chipWord)];
}

/** Whether a second look at it is open, or was answered with keeping it. */
export const hasDoubt = (reading: ReadingRow): boolean =>
  reading.secondLook === 'doubted' || reading.secondLook === 'kept';

/** A run's rungs as its column draws them. */
export function columnOf(view: RunView, rows: readonly RunTableRow[]): ColumnRung[] {
  return view.rungs.map((rung) => ({
    ...rung,
    readings: rows
      .filter(({ reading }) => reading.rungId === rung.id)
      .map(({ reading, corrected }) => ({
        id: reading.id,
        correctedText: corrected?.text ?? null,
        mark: reading.mark,
        hasDoubt: hasDoubt(reading),
        isUsed: reading.isUsed,
      })),
  }));
}

/** The unit that all of these share, for the header of a column; null when they differ and each cell says its own. */
export function sharedUnit(units: readonly string[]): string | null {
  const first = units[0];
  return first !== undefined && units.every((unit) => unit === first) ? first : null;
}

/** Planned lifts of a run that have no reading: still to be pulled, or skipped. */
export function openLifts(view: RunView): { toDo: string[]; skipped: string[] } {
  const keyed = new Set(view.readings.map((reading) => reading.rungId));
  const open = view.rungs.filter((rung) => !keyed.has(rung.id));
  const text = (rung: (typeof open)[number]) => `${rung.liftText} ${rung.liftUnit}`;
  return {
    toDo: open.filter((rung) => !rung.isSkipped).map(text),
    skipped: open.filter((rung) => rung.isSkipped).map(text),
  };
}
