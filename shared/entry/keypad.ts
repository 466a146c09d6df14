/* Keying a reading: flow and test pressure, one key at a time.
 *
 * Purpose: what the display shows is exactly the keys that were accepted, and what is committed is exactly what the
 * display showed when SAVE was released.
 *
 * Entry keys (digits, mark, backspace) act when they go down. Commands (a lane, same, clear, save) act when they are
 * released inside the key. A key that goes down again within `bounceMs` of its own release has bounced and does
 * nothing. A refused key changes no text and leaves its reason in `notice` until the next key that is accepted.
 *
 * States: keying → (save released, both texts whole) → saving → `saved` → keying, empty, the pressure remembered;
 * or → `saveFailed` → keying, everything still there. While saving no second commit can start; entry keys pressed
 * then belong to the next reading: they wait and are taken in order after `saved`.
 *
 * Invariants (tests/shared/entry/keypad.test.ts): texts are '' or digits with at most one mark of the shop, within the
 * limits below; one commit between `saved` and `saved`; a refusal changes no text. */

import type { DecimalMark } from '@/shared/schema/primitives';
import { noticeOf, type KeypadNotice, type NoticeCode } from './keypadNotice';

export type Lane = 'flow' | 'pressure';
export type Digit = '0' | '1' | '2' | '3' | '4' | '5' | '6' | '7' | '8' | '9';
export type KeypadKey = Digit | 'mark' | 'backspace' | 'clear' | Lane | 'same' | 'save';
export type KeypadEvent =
  | { type: 'press'; key: KeypadKey; atMs: number }
  | { type: 'release'; key: KeypadKey; atMs: number; isInside: boolean }
  /** the reading is durably on this device */
  | { type: 'saved' }
  /** it is not; the sentence says why and what to do */
  | { type: 'saveFailed'; sentence: string };

export type Commit = { flowText: string; pressureText: string; isPressureRepeated: boolean };

export type KeypadState = {
  lane: Lane;
  flowText: string;
  pressureText: string;
  /** the pressure was taken over by "same", not keyed */
  isPressureRepeated: boolean;
  /** what "same" takes over; null before the first reading */
  lastPressureText: string | null;
  notice: KeypadNotice | null;
  /** what is being made durable right now */
  saving: Commit | null;
  mark: DecimalMark;
  bounceMs: number;
  /** keys that are down, and whether the press was a bounce */
  down: Partial<Record<KeypadKey, 'real' | 'bounce'>>;
  releasedAtMs: Partial<Record<KeypadKey, number>>;
  /** entry keys pressed while saving */
  waiting: KeypadKey[];
};

export const maxWholeDigits = 6;
export const maxDecimals = 4;
export const maxLength = 9;
const maxWaiting = 2 * maxLength;

const digits = new Set<KeypadKey>(['0', '1', '2', '3', '4', '5', '6', '7', '8', '9']);
/** True for keys that act when they go down. */
export function isEntryKey(key: KeypadKey): boolean {
  return digits.has(key) || key === 'mark' || key === 'backspace';
}

/** Half-keyed digits as they are kept over a killed tab. */
export type KeypadDraft = Pick<KeypadState, 'lane' | 'flowText' | 'pressureText' | 'isPressureRepeated'>;

/** A pad ready for the next reading, or for going on with half-keyed digits.
 * @param bounceMs 50 to 250 ms; anything else is brought to the nearer end
 */
export function startKeypad(options: {
  mark: DecimalMark;
  lastPressureText?: string | null;
  bounceMs?: number;
  draft?: KeypadDraft | null;
}): KeypadState {
  return {
    lane: 'flow',
    flowText: '',
    pressureText: '',
    isPressureRepeated: false,
    ...options.draft,
    lastPressureText: options.lastPressureText ?? null,
    notice: null,
    saving: null,
    mark: options.mark,
    bounceMs: Math.min(250, Math.max(50, options.bounceMs ?? 80)),
    down: {},
    releasedAtMs: {},
    waiting: [],
  };
}

/** What has to be kept so that a killed tab opens with the same digits. */
export function draftOf(state: KeypadState): KeypadDraft {
  const { lane, flowText, pressureText, isPressureRepeated } = state;
  return { lane, flowText, pressureText, isPressureRepeated };
}

/** True when the big key would go on to the pressure instead of saving. */
export function isNextPressure(state: KeypadState): boolean {
  return state.lane === 'flow' && isWhole(state.flowText) && state.pressureText === '';
}

/** One event. `commit` is set exactly when a reading has to be made durable now; answer with `saved` or `saveFailed`. */
export function stepKeypad(
  state: KeypadState,
  event: KeypadEvent,
): { state: KeypadState; commit: Commit | null } {
  switch (event.type) {
    case 'press':
      return { state: press(state, event.key, event.atMs), commit: null };
    case 'release':
      return release(state, event.key, event.atMs, event.isInside);
    case 'saved':
      return { state: saved(state), commit: null };
    case 'saveFailed':
      if (!state.saving) return { state, commit: null };
      return {
        state: {
          ...state,
          saving: null,
          waiting: [],
          notice: { code: 'notSaved', sentence: event.sentence },
        },
        commit: null,
      };
  }
}

function press(state: KeypadState, key: KeypadKey, atMs: number): KeypadState {
  const releasedAt = state.releasedAtMs[key];
  if (releasedAt !== undefined && atMs - releasedAt < state.bounceMs) {
    return refuse({ ...state, down: { ...state.down, [key]: 'bounce' } }, 'repeatIgnored');
  }
  const next: KeypadState = { ...state, down: { ...state.down, [key]: 'real' } };
  if (!isEntryKey(key)) return next;
  if (!state.saving) return enter(next, key);
  if (state.waiting.length >= maxWaiting) return refuse(next, 'stillSaving');
  return { ...next, waiting: [...state.waiting, key] };
}

function release(state: KeypadState, key: KeypadKey, atMs: number, isInside: boolean) {
  const wasDown = state.down[key];
  if (wasDown === undefined) return { state, commit: null };
  const down = { ...state.down };
  delete down[key];
  const next: KeypadState = { ...state, down, releasedAtMs: { ...state.releasedAtMs, [key]: atMs } };
  if (wasDown === 'bounce' || !isInside || isEntryKey(key) || state.saving)
    return { state: next, commit: null };
  return command(next, key);
}

function command(state: KeypadState, key: KeypadKey): { state: KeypadState; commit: Commit | null } {
  switch (key) {
    case 'flow':
    case 'pressure':
      return { state: { ...state, lane: key, notice: null }, commit: null };
    case 'clear':
      return { state: withText(state, ''), commit: null };
    case 'same':
      return { state: takeSamePressure(state), commit: null };
    case 'save':
      return save(state);
    default:
      return { state, commit: null };
  }
}

function takeSamePressure(state: KeypadState): KeypadState {
  if (state.lastPressureText === null) return refuse(state, 'noPressureBefore');
  return { ...state, pressureText: state.lastPressureText, isPressureRepeated: true, notice: null };
}

function save(state: KeypadState): { state: KeypadState; commit: Commit | null } {
  const { flowText, pressureText, isPressureRepeated } = state;
  const no = (code: NoticeCode) => ({ state: refuse(state, code), commit: null });
  if (flowText === '') return no('flowMissing');
  if (!isWhole(flowText)) return no('flowEndsInMark');
  if (isNextPressure(state)) return { state: { ...state, lane: 'pressure', notice: null }, commit: null };
  if (pressureText === '') return no('pressureMissing');
  if (!isWhole(pressureText)) return no('pressureEndsInMark');
  const commit = { flowText, pressureText, isPressureRepeated };
  return { state: { ...state, saving: commit, notice: null }, commit };
}

function saved(state: KeypadState): KeypadState {
  if (!state.saving) return state;
  const fresh: KeypadState = {
    ...state,
    lane: 'flow',
    flowText: '',
    pressureText: '',
    isPressureRepeated: false,
    lastPressureText: state.saving.pressureText,
    notice: null,
    saving: null,
    waiting: [],
  };
  return state.waiting.reduce(enter, fresh);
}

/** An entry key on the lane in front. */
function enter(state: KeypadState, key: KeypadKey): KeypadState {
  const text = textOf(state);
  if (key === 'backspace') return withText(state, text.slice(0, -1));
  const markAt = text.indexOf(state.mark);
  if (key === 'mark') {
    if (markAt >= 0) return refuse(state, 'secondMark');
    if (text.length + 1 >= maxLength) return refuse(state, 'tooLong');
    return withText(state, text === '' ? `0${state.mark}` : text + state.mark);
  }
  if (text.length >= maxLength) return refuse(state, 'tooLong');
  if (markAt < 0 && text.length >= maxWholeDigits) return refuse(state, 'tooManyWhole');
  if (markAt >= 0 && text.length - markAt > maxDecimals) return refuse(state, 'tooManyDecimals');
  return withText(state, text + key);
}

function refuse(state: KeypadState, code: NoticeCode): KeypadState {
  return { ...state, notice: noticeOf(code) };
}

function textOf(state: KeypadState): string {
  return state.lane === 'flow' ? state.flowText : state.pressureText;
}

function withText(state: KeypadState, text: string): KeypadState {
  if (state.lane === 'flow') return { ...state, flowText: text, notice: null };
  return { ...state, pressureText: text, isPressureRepeated: false, notice: null };
}

function isWhole(text: string): boolean {
  return /\d$/.test(text);
}
