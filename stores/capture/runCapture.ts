import { createStore, type StoreApi } from 'zustand/vanilla';
import { AppError } from '@/shared/errors';
import {
  draftOf,
  startKeypad,
  stepKeypad,
  type Commit,
  type KeypadEvent,
  type KeypadState,
} from '@/shared/entry/keypad';
import type { LiftUnit } from '@/shared/schema/primitives';
import type { Chip } from '@/shared/schema/records';
import type { ReadingRow, RungRow, RunView, SessionView } from '@/shared/schema/views';
import { nextRung } from '@/shared/session/nextRung';
import type { SaveReadingInput } from '@/stores/bench/verbs';
import { createDraftKeeper } from './draftKeeper';
import { emptyDraft, keypadPart, type RunDraft } from './runDraft';

/* The capture screen's state between the pad and the device.
 *
 * Purpose: one press of SAVE is one reading, said to be saved only when the device has it; the next lift is up by
 * itself; whatever is half-keyed is kept on the device at every key.
 *
 * States of the lift: keying a rung → (saved, skipped) → the next one that is open → … → finished (`rungId` null).
 * Going to another lift takes the half-keyed digits along: whoever notices a wrong lift has not keyed in vain.
 * While a reading is being stored no draft is written; its own transaction carries the next one. */

/** The reading that was saved or looked at last, as far as the screen needs it before the device is read again. */
export type SavedReading = Commit & { readingId: string; rung: RungRow; atMs: number };

export type RunCaptureState = {
  keypad: KeypadState;
  /** the lift being keyed; null when nothing is left to key */
  rungId: string | null;
  /** notes on the reading being keyed */
  chips: Chip[];
  saved: SavedReading | null;
  /** what did not work, other than a SAVE, which the pad says itself */
  failure: string | null;
  /** the half-keyed digits could not be kept */
  isDraftAtRisk: boolean;
};

export type RunCaptureVerbs = {
  saveReading: (input: SaveReadingInput) => Promise<string>;
  undoReading: (readingId: string) => Promise<void>;
  skipRung: (rungId: string) => Promise<void>;
  unskipRung: (rungId: string) => Promise<void>;
  addRung: (runId: string, lift: { text: string; unit: LiftUnit }) => Promise<string>;
  saveDraft: (runId: string, draft: RunDraft) => Promise<void>;
};

export type RunCapture = {
  store: StoreApi<RunCaptureState>;
  /** the session was read again */
  setView: (view: SessionView) => void;
  send: (event: KeypadEvent) => void;
  goToRung: (rungId: string) => Promise<void>;
  skip: () => Promise<void>;
  undo: (reading: Pick<ReadingRow, 'id' | 'rungId'>) => Promise<void>;
  addLift: (text: string, unit: LiftUnit) => Promise<void>;
  toggleChip: (chip: Chip) => void;
};

export type RunCaptureOptions = {
  view: SessionView;
  runId: string;
  draft: RunDraft | null;
  bounceMs: number;
  nowMs: () => number;
  verbs: RunCaptureVerbs;
  /** told what stands in the fields, for the screen that is shown after a fault */
  onDigits: (digits: { lift: string; flowText: string; pressureText: string } | null) => void;
};

/** Makes the state of one run's capture screen. */
export function createRunCapture(options: RunCaptureOptions): RunCapture {
  const { runId, verbs } = options;
  let runView = viewOf(options.view, runId);
  /** saved here, not yet in the view */
  let keyedIds: string[] = [];
  /** added here, not yet in the view */
  let awaitedRungId: string | null = null;

  const store = createStore<RunCaptureState>()(() => startState(options, runView));
  const { getState: get, setState: set } = store;
  const keeper = createDraftKeeper(
    (draft) => verbs.saveDraft(runId, draft),
    (isDraftAtRisk) => {
      if (get().isDraftAtRisk !== isDraftAtRisk) set({ isDraftAtRisk });
    },
  );
  const rungOf = (rungId: string | null) => runView.rungs.find((rung) => rung.id === rungId);

  function keepDraft(): void {
    const { keypad, rungId, chips } = get();
    const rung = rungOf(rungId);
    const { flowText, pressureText } = keypad;
    const lift = rung ? `${rung.liftText} ${rung.liftUnit}` : '';
    options.onDigits(flowText || pressureText ? { lift, flowText, pressureText } : null);
    keeper.keep({ rungId, chips, ...draftOf(keypad) });
  }

  async function attempt(work: () => Promise<void>): Promise<void> {
    set({ failure: null });
    try {
      await work();
    } catch (error) {
      set({ failure: sentenceFor(error) });
    }
  }

  async function save(commit: Commit): Promise<void> {
    const { rungId, chips } = get();
    const rung = rungOf(rungId);
    if (!rung)
      return step({ type: 'saveFailed', sentence: 'Choose a lift first. The digits are still here.' });
    const after = nextRung(runView, rung.id, [...keyedIds, rung.id]);
    keeper.drop();
    let readingId: string;
    try {
      readingId = await verbs.saveReading({
        runId,
        rungId: rung.id,
        liftText: rung.liftText,
        liftUnit: rung.liftUnit,
        ...commit,
        chips,
        nextDraft: emptyDraft(after?.id ?? null),
      });
    } catch (error) {
      step({ type: 'saveFailed', sentence: `Not saved. ${sentenceFor(error)}` });
      keepDraft();
      return;
    }
    keyedIds = [...keyedIds, rung.id];
    const hasMoved = get().rungId !== rung.id;
    set((state) => ({
      keypad: stepKeypad(state.keypad, { type: 'saved' }).state,
      rungId: hasMoved ? state.rungId : (after?.id ?? null),
      chips: state.chips === chips ? [] : state.chips,
      saved: { ...commit, readingId, rung, atMs: options.nowMs() },
      failure: null,
      isDraftAtRisk: false,
    }));
    const { flowText, pressureText } = get().keypad;
    if (hasMoved || flowText || pressureText) keepDraft();
    else options.onDigits(null);
  }

  function step(event: KeypadEvent): void {
    const before = get().keypad;
    const { state, commit } = stepKeypad(before, event);
    set({ keypad: state, ...(get().failure === null ? {} : { failure: null }) });
    if (commit) void save(commit);
    else if (!state.saving && isChanged(before, state)) keepDraft();
  }

  function moveTo(rungId: string | null): void {
    set({ rungId, saved: null });
    keepDraft();
  }

  return {
    store,
    setView: (view) => {
      runView = viewOf(view, runId);
      const known = new Set(runView.readings.map((reading) => reading.rungId));
      keyedIds = keyedIds.filter((id) => !known.has(id));
      if (awaitedRungId === null || !rungOf(awaitedRungId)) return;
      const rungId = awaitedRungId;
      awaitedRungId = null;
      moveTo(rungId);
    },
    send: step,
    goToRung: (rungId) =>
      attempt(async () => {
        if (rungOf(rungId)?.isSkipped) await verbs.unskipRung(rungId);
        moveTo(rungId);
      }),
    skip: () =>
      attempt(async () => {
        const { rungId } = get();
        if (rungId === null) return;
        await verbs.skipRung(rungId);
        moveTo(nextRung(runView, rungId, [...keyedIds, rungId])?.id ?? null);
      }),
    undo: (reading) =>
      attempt(async () => {
        await verbs.undoReading(reading.id);
        keyedIds = keyedIds.filter((id) => id !== reading.rungId);
        const { flowText, pressureText } = get().keypad;
        // digits that are half-keyed belong to the lift they were keyed for
        if (reading.rungId !== null && !flowText && !pressureText) moveTo(reading.rungId);
        else set({ saved: null });
      }),
    addLift: (text, unit) =>
      attempt(async () => {
        const rungId = await verbs.addRung(runId, { text, unit });
        if (rungOf(rungId)) moveTo(rungId);
        else awaitedRungId = rungId;
      }),
    toggleChip: (chip) => {
      const { chips } = get();
      set({ chips: chips.includes(chip) ? chips.filter((each) => each !== chip) : [...chips, chip] });
      keepDraft();
    },
  };
}

function startState(options: RunCaptureOptions, runView: RunView): RunCaptureState {
  const { draft } = options;
  const isKnown = draft !== null && runView.rungs.some((rung) => rung.id === draft.rungId);
  return {
    keypad: startKeypad({
      mark: options.view.session.settings.decimalMark,
      lastPressureText: runView.readings.at(-1)?.pressureText ?? null,
      bounceMs: options.bounceMs,
      draft: draft ? keypadPart(draft) : null,
    }),
    rungId: isKnown ? draft.rungId : (nextRung(runView, null)?.id ?? null),
    chips: draft?.chips ?? [],
    saved: null,
    failure: null,
    isDraftAtRisk: false,
  };
}

function viewOf(view: SessionView, runId: string): RunView {
  const found = view.runs.find(({ run }) => run.id === runId);
  if (!found) throw new AppError('no_such_record');
  return found;
}

function isChanged(a: KeypadState, b: KeypadState): boolean {
  return (
    a.flowText !== b.flowText ||
    a.pressureText !== b.pressureText ||
    a.lane !== b.lane ||
    a.isPressureRepeated !== b.isPressureRepeated
  );
}

const sentenceFor = (error: unknown): string =>
  (error instanceof AppError ? error : new AppError('not_saved')).message;
