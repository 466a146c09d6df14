import { act, fireEvent, render, screen } from '@testing-library/react';
import { useState } from 'react';
import { CaptureScreen } from '@/components/capture/CaptureScreen';
import type { CaptureProps, ShownResult } from '@/components/capture/captureProps';
import { Column } from '@/components/column/Column';
import { columnLabel, waterLevel, type ColumnRung } from '@/components/column/rungState';
import { startKeypad, stepKeypad, type Commit } from '@/shared/entry/keypad';
import type { Mark } from '@/shared/schema/views';

/** A phone in a browser tab; react-native-web reads the window's size from the document. */
beforeAll(() => {
  Object.defineProperty(document.documentElement, 'clientWidth', { value: 390, configurable: true });
  Object.defineProperty(document.documentElement, 'clientHeight', { value: 664, configurable: true });
  window.dispatchEvent(new Event('resize'));
});

function rung(at: number, mark?: Mark, more: Partial<ColumnRung> = {}): ColumnRung {
  return {
    id: `rung-${at}`,
    liftText: `${at * 2}`,
    liftUnit: 'mm',
    isSkipped: false,
    readings: mark
      ? [{ id: `reading-${at}`, correctedText: '29.8', mark, hasDoubt: false, isUsed: true }]
      : [],
    ...more,
  };
}
const rungs = [rung(1, 'sent'), rung(2, 'onDevice'), rung(3), rung(4)];

/** The screen with a real reducer behind it, as the container has it. */
function Bench({ onCommit, ...over }: Partial<CaptureProps> & { onCommit?: (commit: Commit) => void }) {
  const [keypad, setKeypad] = useState(() => startKeypad({ mark: '.', lastPressureText: '28.0' }));
  const nothing = () => undefined;
  return (
    <CaptureScreen
      runTitle="Intake 1"
      rungs={rungs}
      currentRungId="rung-3"
      keypad={keypad}
      result={null}
      facts={{ who: 'Mara', where: '2 saved on this device', needsPersonCount: 1 }}
      flowUnit="cfm"
      pressureUnit="inH2O"
      standardPressure="28 inH₂O"
      chips={[]}
      onKeypadEvent={(event) => {
        const step = stepKeypad(keypad, event);
        setKeypad(step.state);
        if (step.commit) onCommit?.(step.commit);
      }}
      onUndo={nothing}
      onRepeat={nothing}
      onSkip={nothing}
      onGoToRung={nothing}
      onAddLift={nothing}
      onToggleChip={nothing}
      onOpenWorking={nothing}
      onOpenStatus={nothing}
      onLeave={nothing}
      onFinishRun={nothing}
      {...over}
    />
  );
}
/** A button by its label or its words. Asking for roles computes the style of every key, seconds on a slow machine. */
function key(name: string | RegExp): HTMLElement {
  const [found] = [...screen.queryAllByLabelText(name), ...screen.queryAllByText(name)].map((at) =>
    at.closest('button'),
  );
  if (!found) throw new Error(`no button ${name}`);
  return found;
}
function press(name: string | RegExp) {
  fireEvent.pointerDown(key(name));
  fireEvent.pointerUp(key(name));
}
/** What a value box shows, its words for the ear included. */
function box(lane: 'flow' | 'pressure'): string {
  return (key(new RegExp(`^\\s*${lane}( |$)`)).textContent ?? '').replace(/\s+/g, ' ').trim();
}

it('keys a reading by the pad: flow, pressure, SAVE', () => {
  const onCommit = jest.fn();
  render(<Bench onCommit={onCommit} />);
  for (const key of ['9', '4', 'Decimal point', '3']) press(key);
  expect(box('flow')).toBe('flow cfm94.3');
  press('On to the pressure');
  for (const key of ['2', '8']) press(key);
  press('SAVE');
  expect(onCommit).toHaveBeenCalledWith({ flowText: '94.3', pressureText: '28', isPressureRepeated: false });
});

it('keys a reading by a keyboard: digits, comma, Enter, Backspace', () => {
  const onCommit = jest.fn();
  render(<Bench onCommit={onCommit} />);
  for (const key of ['9', '4', ',', '5', 'Backspace', '3', 'Enter', '2', '8', 'Enter']) {
    fireEvent.keyDown(document.body, { key });
    fireEvent.keyUp(document.body, { key });
  }
  expect(onCommit).toHaveBeenCalledWith({ flowText: '94.3', pressureText: '28', isPressureRepeated: false });
});

it('keys typed into a sheet in front are not the pad’s', () => {
  render(<Bench />);
  press('more');
  fireEvent.keyDown(document.body, { key: '9' });
  fireEvent.keyUp(document.body, { key: '9' });
  press('Back');
  expect(box('flow')).toBe('flow cfm empty');
});

it('a digit counts while the thumb is still down', () => {
  render(<Bench />);
  fireEvent.pointerDown(key('7'));
  expect(box('flow')).toBe('flow cfm7');
});

it('says why a key was refused and changes nothing', () => {
  render(<Bench />);
  press('1');
  press('Decimal point');
  press('2');
  fireEvent.keyDown(document.body, { key: ',' });
  expect(document.querySelector('[role=alert]')?.textContent).toBe('Only one decimal mark.');
  expect(box('flow')).toBe('flow cfm1.2');
});

it('the shop’s comma stands on the pad', () => {
  render(<Bench keypad={startKeypad({ mark: ',' })} />);
  expect(key('Decimal comma').textContent).toBe(',');
});

describe('the figure just saved', () => {
  beforeEach(() => jest.useFakeTimers());
  afterEach(() => jest.useRealTimers());
  const saved = (): ShownResult => ({
    readingId: 'reading-2',
    correctedText: '67.3',
    words: 'Saved on this device',
    undoUntilMs: Date.now() + 10_000,
  });
  it('stands there with its words, and UNDO for ten seconds', () => {
    const onUndo = jest.fn();
    render(<Bench result={saved()} onUndo={onUndo} />);
    expect(key('Saved on this device').textContent).toContain('67.3 cfm');
    press('UNDO the last reading');
    expect(onUndo).toHaveBeenCalledWith('reading-2');
    act(() => {
      jest.advanceTimersByTime(10_001);
    });
    expect(screen.queryByLabelText('UNDO the last reading')).toBeNull();
    expect(key('Saved on this device').textContent).toContain('corrected to 28 inH₂O');
  });
});

it('the column flashes when a reading was saved, not when the screen opens', () => {
  const { rerender, container } = render(<Column rungs={rungs} height={400} flashId="reading-1" />);
  expect(container.querySelector('[data-flash]')).toBeNull();
  rerender(<Column rungs={rungs} height={400} flashId="reading-2" />);
  expect(container.querySelector('[data-flash=once]')).not.toBeNull();
});

it('a doubt stands above the pad with its answers and goes when keying goes on', () => {
  const onAnswerDoubt = jest.fn();
  const doubt = {
    sentence: '942 cfm is 10 times the curve.',
    answers: [
      { id: 'take', title: '94.2' },
      { id: 'keep', title: 'Keep' },
    ],
  };
  render(<Bench doubt={doubt} onAnswerDoubt={onAnswerDoubt} />);
  press('94.2');
  expect(onAnswerDoubt).toHaveBeenCalledWith('take');
  press('1');
  expect(screen.queryByText(doubt.sentence)).toBeNull();
  expect(box('flow')).toBe('flow cfm1');
});

it('goes to any lift by the list of lifts', () => {
  const onGoToRung = jest.fn();
  render(<Bench onGoToRung={onGoToRung} />);
  press('lifts');
  fireEvent.click(key('2 mm'));
  expect(onGoToRung).toHaveBeenCalledWith('rung-1');
  expect(document.querySelector('[role=dialog]')).toBeNull();
});

it.each([
  [/^Repeat a lift/, 'onRepeat'],
  [/^Skip lift 6 mm/, 'onSkip'],
  [/^Add a lift/, 'onAddLift'],
  [/^Finish this run/, 'onFinishRun'],
  [/^Leave to the runs/, 'onLeave'],
] as const)('under "more" %s closes the panel and asks for %s', (name, verb) => {
  const act = jest.fn();
  render(<Bench {...{ [verb]: act }} />);
  press('more');
  press(name);
  expect(act).toHaveBeenCalledTimes(1);
  expect(document.querySelector('[role=dialog]')).toBeNull();
});

it('with every lift done there is no pad, and keys do nothing', () => {
  const onKeypadEvent = jest.fn();
  render(<Bench currentRungId={null} onKeypadEvent={onKeypadEvent} />);
  expect(screen.queryByLabelText('Number pad')).toBeNull();
  fireEvent.keyDown(document.body, { key: '1' });
  expect(onKeypadEvent).not.toHaveBeenCalled();
  expect(key('Finish this run')).toBeTruthy();
});

it('a run that cannot be keyed says why instead of showing the pad', () => {
  render(<Bench lockedSentence="Session 3-012 was handed in." />);
  expect(screen.getByText(/was handed in/)).toBeTruthy();
  expect(screen.queryByLabelText('SAVE')).toBeNull();
});

describe('the column in words', () => {
  it('counts by where readings live', () => {
    const all = [...rungs, rung(5, undefined, { isSkipped: true }), rung(6, 'dispute')];
    expect(columnLabel(all)).toBe('3 of 6 lifts saved, 1 in dispute, 1 on this device, 1 sent, 1 skipped');
  });
  it('water stands up to the first lift that is neither saved nor skipped', () => {
    expect(
      waterLevel([rung(1, 'sent'), rung(2, undefined, { isSkipped: true }), rung(3), rung(4, 'sent')]),
    ).toBe(2);
  });
  it('a reading set out of use leaves its rung empty', () => {
    const undone = rung(1, 'sent');
    const readings = undone.readings.map((reading) => ({ ...reading, isUsed: false }));
    expect(waterLevel([{ ...undone, readings }])).toBe(0);
  });
});
