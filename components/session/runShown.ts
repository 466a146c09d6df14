import type { ShownResult } from '@/components/capture/captureProps';
import { markWords } from '@/components/column/rungState';
import type { KeypadState } from '@/shared/entry/keypad';
import type { KeypadNotice } from '@/shared/entry/keypadNotice';
import { correctReading } from '@/shared/flow/correctReading';
import type { ReadingRow, RungRow, RunView, SessionView } from '@/shared/schema/views';

/** The reading that was saved a moment ago, before the device is read again. */
export type SavedNow = {
  readingId: string;
  flowText: string;
  pressureText: string;
  rung: Pick<RungRow, 'id' | 'liftText' | 'liftUnit'>;
  atMs: number;
};

const undoShownMs = 10_000;
/** From its own lift a reading is undone as long as the screen is open. */
const fromTheRungMs = 24 * 60 * 60 * 1000;

/** What stands in the result row: the reading saved just now; otherwise the last one of the lift being keyed, to be
 * undone from there; otherwise the last of the run. */
export function shownResult(
  view: SessionView,
  run: RunView,
  rungId: string | null,
  saved: SavedNow | null,
  mayUndo: boolean,
): ShownResult | null {
  const { settings } = view.session;
  if (saved) {
    const mark = run.readings.find((reading) => reading.id === saved.readingId)?.mark ?? 'onDevice';
    const keyed = { ...saved, flowUnit: settings.flowUnit, pressureUnit: settings.pressureUnit };
    return {
      readingId: saved.readingId,
      correctedText: correctReading(keyed, settings, run.run.direction)?.text ?? null,
      words: mark === 'onDevice' ? 'Saved on this device' : `saved, ${markWords[mark]}`,
      undoUntilMs: mayUndo ? saved.atMs + undoShownMs : null,
    };
  }
  const used = run.readings.filter((reading) => reading.isUsed);
  const ofRung = rungId === null ? undefined : used.filter((reading) => reading.rungId === rungId).at(-1);
  const reading = ofRung ?? used.at(-1);
  if (!reading) return null;
  return {
    readingId: reading.id,
    correctedText: correctReading(reading, settings, run.run.direction)?.text ?? null,
    words: ofRung ? `this lift, ${markWords[reading.mark]}` : liftWords(reading),
    undoUntilMs: ofRung && mayUndo ? Date.now() + fromTheRungMs : null,
  };
}

/** What the pad has to say: its own reason first, then what else did not work. */
export function noticeFor(state: {
  keypad: Pick<KeypadState, 'notice'>;
  failure: string | null;
  isDraftAtRisk: boolean;
}): KeypadNotice | null {
  if (state.keypad.notice) return state.keypad.notice;
  if (state.failure !== null) return { code: 'notSaved', sentence: state.failure };
  if (state.isDraftAtRisk)
    return {
      code: 'notSaved',
      sentence: 'The device cannot keep half-keyed digits just now. Keep this page open.',
    };
  return null;
}

const liftWords = (reading: ReadingRow): string =>
  `${reading.liftText} ${reading.liftUnit}, ${markWords[reading.mark]}`;
