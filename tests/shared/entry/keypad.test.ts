import fc from 'fast-check';
import { hardwareKey } from '@/shared/entry/hardwareKey';
import {
  draftOf,
  isNextPressure,
  maxDecimals,
  maxLength,
  maxWholeDigits,
  startKeypad,
  stepKeypad,
  type Commit,
  type KeypadEvent,
  type KeypadKey,
  type KeypadState,
} from '@/shared/entry/keypad';
import { KeyedText } from '@/shared/schema/primitives';

/** A pad that a test presses; time runs by itself, well beyond the bounce. */
function pad(options: Partial<Parameters<typeof startKeypad>[0]> = {}) {
  let state = startKeypad({ mark: '.', ...options });
  let atMs = 1000;
  const commits: Commit[] = [];
  const send = (event: KeypadEvent) => {
    const step = stepKeypad(state, event);
    state = step.state;
    if (step.commit) commits.push(step.commit);
  };
  return {
    commits,
    send,
    get state(): KeypadState {
      return state;
    },
    press(...keys: KeypadKey[]) {
      for (const key of keys) {
        send({ type: 'press', key, atMs: (atMs += 300) });
        send({ type: 'release', key, atMs: (atMs += 40), isInside: true });
      }
    },
    key(text: string) {
      this.press(...[...text].map((key) => hardwareKey(key) as KeypadKey));
    },
    reading(flow: string, pressure: string) {
      this.key(flow);
      this.press('pressure');
      this.key(pressure);
    },
  };
}

it('shows exactly the keys that were accepted', () => {
  const p = pad();
  p.reading('241.5', '28');
  expect(draftOf(p.state)).toEqual({
    lane: 'pressure',
    flowText: '241.5',
    pressureText: '28',
    isPressureRepeated: false,
  });
});

it('a digit counts when it goes down, before it is released', () => {
  const p = pad();
  p.send({ type: 'press', key: '7', atMs: 0 });
  expect(p.state.flowText).toBe('7');
  p.send({ type: 'release', key: '7', atMs: 50, isInside: false });
  expect(p.state.flowText).toBe('7');
});

it('two thumbs may overlap', () => {
  const p = pad();
  p.send({ type: 'press', key: '1', atMs: 0 });
  p.send({ type: 'press', key: '2', atMs: 20 });
  p.send({ type: 'release', key: '1', atMs: 40, isInside: true });
  p.send({ type: 'release', key: '2', atMs: 60, isInside: true });
  expect(p.state.flowText).toBe('12');
});

it('a mark first gives 0 and the mark', () => {
  const p = pad();
  p.key('.5');
  expect(p.state.flowText).toBe('0.5');
});

it.each(['.', ','] as const)('takes comma and point and writes the shop’s %s', (mark) => {
  const p = pad({ mark });
  p.key('1,5');
  p.press('pressure');
  p.key('2.5');
  expect([p.state.flowText, p.state.pressureText]).toEqual([`1${mark}5`, `2${mark}5`]);
});

it.each([
  ['1.2.', '1.2', 'secondMark'],
  ['1234567', '123456', 'tooManyWhole'],
  ['1.23456', '1.2345', 'tooManyDecimals'],
  ['12345.6789', '12345.678', 'tooLong'],
  ['123456.789', '123456.78', 'tooLong'],
])('of %s it takes %s and says %s', (keys, text, code) => {
  const p = pad();
  p.key(keys);
  expect(p.state.flowText).toBe(text);
  expect(p.state.notice?.code).toBe(code);
});

it('the reason goes with the next accepted key', () => {
  const p = pad();
  p.key('1..');
  expect(p.state.notice?.code).toBe('secondMark');
  p.key('5');
  expect(p.state.notice).toBeNull();
});

describe('bounce', () => {
  it.each([
    [79, '4', 'repeatIgnored'],
    [80, '44', undefined],
  ])('the same key %i ms after its release leaves %s', (gapMs, text, code) => {
    const p = pad();
    p.send({ type: 'press', key: '4', atMs: 0 });
    p.send({ type: 'release', key: '4', atMs: 100, isInside: true });
    p.send({ type: 'press', key: '4', atMs: 100 + gapMs });
    expect(p.state.flowText).toBe(text);
    expect(p.state.notice?.code).toBe(code);
  });
  it('another key that soon is no bounce', () => {
    const p = pad();
    p.send({ type: 'press', key: '4', atMs: 0 });
    p.send({ type: 'release', key: '4', atMs: 10, isInside: true });
    p.send({ type: 'press', key: '5', atMs: 11 });
    expect(p.state.flowText).toBe('45');
  });
  it('a bounced SAVE saves nothing when it is released', () => {
    const p = pad();
    p.reading('1', '2');
    p.send({ type: 'press', key: 'save', atMs: 90_000 });
    p.send({ type: 'release', key: 'save', atMs: 90_010, isInside: false });
    p.send({ type: 'press', key: 'save', atMs: 90_020 });
    p.send({ type: 'release', key: 'save', atMs: 90_090, isInside: true });
    expect(p.commits).toEqual([]);
  });
  it.each([
    [10, 50],
    [80, 80],
    [900, 250],
  ])('a setting of %i ms holds as %i', (set, held) => {
    expect(startKeypad({ mark: '.', bounceMs: set }).bounceMs).toBe(held);
  });
});

describe('SAVE', () => {
  it('acts when released inside the key and commits what the display shows', () => {
    const p = pad();
    p.reading('241.5', '28.0');
    p.send({ type: 'press', key: 'save', atMs: 50_000 });
    p.send({ type: 'press', key: '7', atMs: 50_010 });
    p.send({ type: 'release', key: 'save', atMs: 50_100, isInside: true });
    expect(p.commits).toEqual([{ flowText: '241.5', pressureText: '28.07', isPressureRepeated: false }]);
  });
  it('released outside does nothing', () => {
    const p = pad();
    p.reading('1', '2');
    p.send({ type: 'press', key: 'save', atMs: 50_000 });
    p.send({ type: 'release', key: 'save', atMs: 50_100, isInside: false });
    expect(p.commits).toEqual([]);
    expect(p.state.saving).toBeNull();
  });
  it('cannot fire twice for one reading', () => {
    const p = pad();
    p.reading('1', '2');
    p.press('save', 'save', 'save');
    expect(p.commits).toHaveLength(1);
  });
  it.each([
    ['', '28', 'flowMissing'],
    ['12.', '28', 'flowEndsInMark'],
    ['12', '', 'pressureMissing'],
    ['12', '28.', 'pressureEndsInMark'],
  ])('with flow %s and pressure %s it is refused: %s', (flow, pressure, code) => {
    const p = pad();
    p.reading(flow, pressure);
    p.press('save');
    expect(p.commits).toEqual([]);
    expect(p.state.notice?.code).toBe(code);
  });
  it('goes on to the pressure when only the flow is there', () => {
    const p = pad();
    p.key('29.8');
    expect(isNextPressure(p.state)).toBe(true);
    p.press('save');
    expect(p.state).toMatchObject({ lane: 'pressure', flowText: '29.8', notice: null });
    p.key('28');
    p.press('save');
    expect(p.commits).toEqual([{ flowText: '29.8', pressureText: '28', isPressureRepeated: false }]);
  });
  it('a key released without having gone down here does nothing', () => {
    const p = pad();
    p.reading('1', '2');
    p.send({ type: 'release', key: 'save', atMs: 99_000, isInside: true });
    expect(p.commits).toEqual([]);
  });
});

describe('while it is being saved', () => {
  it('keys wait and belong to the next reading', () => {
    const p = pad();
    p.reading('29.8', '28');
    p.press('save');
    p.key('67.3');
    expect(p.state.flowText).toBe('29.8');
    p.send({ type: 'saved' });
    expect(p.state).toMatchObject({
      lane: 'flow',
      flowText: '67.3',
      pressureText: '',
      lastPressureText: '28',
    });
  });
  it('a failure keeps every digit and allows SAVE again', () => {
    const p = pad();
    p.reading('29.8', '28');
    p.press('save');
    p.key('6');
    p.send({ type: 'saveFailed', sentence: 'Not saved: this device is full. Press SAVE again.' });
    expect(p.state).toMatchObject({ flowText: '29.8', pressureText: '28', saving: null });
    expect(p.state.notice?.sentence).toMatch('this device is full');
    p.press('save');
    expect(p.commits).toHaveLength(2);
    expect(p.commits[1]).toEqual(p.commits[0]);
  });
});

describe('same pressure', () => {
  it('takes the last saved one and says that it was not read again', () => {
    const p = pad();
    p.reading('29.8', '28.0');
    p.press('save');
    p.send({ type: 'saved' });
    p.key('67.3');
    p.press('same', 'save');
    expect(p.commits[1]).toEqual({ flowText: '67.3', pressureText: '28.0', isPressureRepeated: true });
  });
  it('is a keyed one as soon as a digit of it is changed', () => {
    const p = pad({ lastPressureText: '28.0' });
    p.press('same', 'pressure', 'backspace');
    p.key('2');
    expect(p.state).toMatchObject({ pressureText: '28.2', isPressureRepeated: false });
  });
  it('has nothing to take before the first reading', () => {
    const p = pad();
    p.press('same');
    expect(p.state.notice?.code).toBe('noPressureBefore');
  });
});

it('opens again with the half-keyed digits', () => {
  const p = pad();
  p.reading('241.', '2');
  const draft = JSON.parse(JSON.stringify(draftOf(p.state))) as ReturnType<typeof draftOf>;
  expect(draftOf(startKeypad({ mark: '.', draft }))).toEqual(draftOf(p.state));
});

const anyKey = fc.constantFrom<KeypadKey>(
  ...(['0', '1', '5', '9', 'mark', 'backspace', 'clear', 'flow', 'pressure', 'same', 'save'] as const),
);
type Untimed = KeypadEvent extends infer E ? (E extends { atMs: number } ? Omit<E, 'atMs'> : E) : never;
const whole = fc.record({ key: anyKey, isInside: fc.boolean() }).map(({ key, isInside }): Untimed[] => [
  { type: 'press', key },
  { type: 'release', key, isInside },
]);
const tap = (key: KeypadKey): Untimed[] => [
  { type: 'press', key },
  { type: 'release', key, isInside: true },
];
const someNumber = fc.array(fc.constantFrom<KeypadKey>('0', '1', '5', '9', 'mark'), { maxLength: 4 });
/** Somebody who means to save a reading, with slips. */
const attempt = fc
  .record({ flow: someNumber, pressure: someNumber, isSavedTwice: fc.boolean() })
  .map(({ flow, pressure, isSavedTwice }): Untimed[] =>
    [
      ...flow,
      'pressure' as const,
      ...pressure,
      'save' as const,
      ...(isSavedTwice ? (['save'] as const) : []),
    ].flatMap(tap),
  );
const half = fc.oneof(
  anyKey.map((key): Untimed[] => [{ type: 'press', key }]),
  fc.record({ key: anyKey, isInside: fc.boolean() }).map((end): Untimed[] => [{ type: 'release', ...end }]),
  fc.constantFrom<Untimed[]>([{ type: 'saved' }], [{ type: 'saveFailed', sentence: 'Not saved.' }]),
);
const anySequence = fc
  .array(
    fc.oneof(
      { weight: 6, arbitrary: whole },
      { weight: 2, arbitrary: half },
      { weight: 1, arbitrary: attempt },
    ),
    { maxLength: 50 },
  )
  .chain((steps) => {
    const events = steps.flat();
    const gaps = fc.array(fc.integer({ min: 0, max: 250 }), {
      minLength: events.length,
      maxLength: events.length,
    });
    return gaps.map((passed) => events.map((event, at): [Untimed, number] => [event, passed[at] ?? 0]));
  });
const anyMark = fc.constantFrom('.' as const, ',' as const);

/** Runs a sequence and shows every step to `look`. */
function run(
  mark: '.' | ',',
  sequence: [Untimed, number][],
  look: (before: KeypadState, after: KeypadState, commit: Commit | null, event: KeypadEvent) => void,
) {
  let state = startKeypad({ mark });
  let atMs = 0;
  for (const [event, passedMs] of sequence) {
    atMs += passedMs;
    const timed: KeypadEvent = 'key' in event ? { ...event, atMs } : event;
    const step = stepKeypad(state, timed);
    look(state, step.state, step.commit, timed);
    state = step.state;
  }
}

it('whatever is pressed, a text is empty or one number in the making, within the limits', () => {
  fc.assert(
    fc.property(anyMark, anySequence, (mark, sequence) => {
      const shape = mark === '.' ? /^(\d{1,6}(\.\d{0,4})?)?$/ : /^(\d{1,6}(,\d{0,4})?)?$/;
      run(mark, sequence, (_before, after) => {
        for (const text of [after.flowText, after.pressureText]) {
          expect(text).toMatch(shape);
          expect(text.length).toBeLessThanOrEqual(maxLength);
          const [whole = '', decimals = ''] = text.split(mark);
          expect(whole.length).toBeLessThanOrEqual(maxWholeDigits);
          expect(decimals.length).toBeLessThanOrEqual(maxDecimals);
        }
      });
    }),
    { numRuns: 300 },
  );
});

it('whatever is pressed, a commit is what was shown, can be stored, and comes once for one reading', () => {
  let commitCount = 0;
  fc.assert(
    fc.property(anyMark, anySequence, (mark, sequence) => {
      let isOpen = false;
      run(mark, sequence, (before, after, commit, event) => {
        if (commit) {
          expect(isOpen).toBe(false);
          isOpen = true;
          commitCount += 1;
          expect(commit).toEqual({
            flowText: before.flowText,
            pressureText: before.pressureText,
            isPressureRepeated: before.isPressureRepeated,
          });
          expect(KeyedText.safeParse(commit.flowText).success).toBe(true);
          expect(KeyedText.safeParse(commit.pressureText).success).toBe(true);
          expect([after.flowText, after.pressureText]).toEqual([commit.flowText, commit.pressureText]);
        }
        if (event.type === 'saved' || event.type === 'saveFailed') isOpen = false;
        expect(after.saving !== null).toBe(isOpen);
      });
    }),
    { numRuns: 300 },
  );
  // the sequences do reach what this is about
  expect(commitCount).toBeGreaterThan(50);
});

it('whatever is pressed, a key that leaves a reason changes no text and no lane', () => {
  fc.assert(
    fc.property(anyMark, anySequence, (mark, sequence) => {
      run(mark, sequence, (before, after, _commit, event) => {
        if (event.type === 'saved' || after.notice === null || after.notice === before.notice) return;
        expect(draftOf(after)).toEqual(draftOf(before));
      });
    }),
    { numRuns: 300 },
  );
});

it('whatever is pressed, one entry key changes at most one character of the lane in front', () => {
  fc.assert(
    fc.property(anyMark, anySequence, (mark, sequence) => {
      run(mark, sequence, (before, after, _commit, event) => {
        if (event.type !== 'press') return;
        const of = (state: KeypadState) => (before.lane === 'flow' ? state.flowText : state.pressureText);
        const other = (state: KeypadState) => (before.lane === 'flow' ? state.pressureText : state.flowText);
        expect(other(after)).toBe(other(before));
        const [from, to] = [of(before), of(after)];
        const isOneMore = to.slice(0, -1) === from || (from === '' && to === `0${mark}`);
        expect(to === from || isOneMore || from.slice(0, -1) === to).toBe(true);
      });
    }),
    { numRuns: 300 },
  );
});
