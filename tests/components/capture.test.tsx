import { act, configure, fireEvent, render, screen, within } from '@testing-library/react';
import { useState } from 'react';
import { CaptureScreen } from '@/components/capture/CaptureScreen';
import type { CaptureProps, ShownResult } from '@/components/capture/captureProps';
import { Column } from '@/components/column/Column';
import { columnLabel, waterLevel, type ColumnRung } from '@/components/column/rungState';
import { startKeypad, stepKeypad, type Commit } from '@/shared/entry/keypad';
import type { Mark } from '@/shared/schema/views';

// nothing is hidden here, and asking the computed style of every key takes most of the time
configure({ defaultHidden: true });

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
function press(name: string | RegExp) {
  const key = screen.getByRole('button', { name });
  fireEvent.pointerDown(key);
  fireEvent.pointerUp(key);
}

it('keys a reading by the pad: flow, pressure, SAVE', () => {
  const onCommit = jest.fn();
  render(<Bench onCommit={onCommit} />);
  for (const key of ['9', '4', 'Decimal point', '3']) press(key);
  expect(screen.getByRole('button', { name: 'Flow, 94.3 cfm' })).toBeTruthy();
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
  expect(screen.getByRole('button', { name: 'Flow, empty cfm' })).toBeTruthy();
});

it('a digit counts while the thumb is still down', () => {
  render(<Bench />);
  fireEvent.pointerDown(screen.getByRole('button', { name: '7' }));
  expect(screen.getByRole('button', { name: 'Flow, 7 cfm' })).toBeTruthy();
});

it('says why a key was refused and changes nothing', () => {
  render(<Bench />);
  press('1');
  press('Decimal point');
  press('2');
  fireEvent.keyDown(document.body, { key: ',' });
  expect(screen.getByRole('alert').textContent).toBe('Only one decimal mark.');
  expect(screen.getByRole('button', { name: 'Flow, 1.2 cfm' })).toBeTruthy();
});

it('the shop’s comma stands on the pad', () => {
  render(<Bench keypad={startKeypad({ mark: ',' })} />);
  expect(screen.getByRole('button', { name: 'Decimal comma' }).textContent).toBe(',');
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
    expect(screen.getByText('Saved on this device')).toBeTruthy();
    press('UNDO the last reading');
    expect(onUndo).toHaveBeenCalledWith('reading-2');
    act(() => {
      jest.advanceTimersByTime(10_001);
    });
    expect(screen.queryByRole('button', { name: 'UNDO the last reading' })).toBeNull();
    expect(screen.getByRole('button', { name: /^Corrected flow 67.3 cfm at 28/ })).toBeTruthy();
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
  expect(screen.getByRole('button', { name: 'Flow, 1 cfm' })).toBeTruthy();
});

it('goes to any lift by the list of lifts', () => {
  const onGoToRung = jest.fn();
  render(<Bench onGoToRung={onGoToRung} />);
  press('lifts');
  const list = screen.getByRole('dialog', { name: 'Intake 1' });
  const lift = within(list).getByRole('button', { name: 'Lift 2 mm, 29.8 cfm, sent' });
  fireEvent.click(lift);
  expect(onGoToRung).toHaveBeenCalledWith('rung-1');
  expect(screen.queryByRole('dialog')).toBeNull();
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
  expect(screen.queryByRole('dialog')).toBeNull();
});

it('with every lift done there is no pad, and keys do nothing', () => {
  const onKeypadEvent = jest.fn();
  render(<Bench currentRungId={null} onKeypadEvent={onKeypadEvent} />);
  expect(screen.queryByRole('group', { name: 'Number pad' })).toBeNull();
  fireEvent.keyDown(document.body, { key: '1' });
  expect(onKeypadEvent).not.toHaveBeenCalled();
  expect(screen.getByRole('button', { name: 'Finish this run' })).toBeTruthy();
});

it('a run that cannot be keyed says why instead of showing the pad', () => {
  render(<Bench lockedSentence="Session 3-012 was handed in." />);
  expect(screen.getByText(/was handed in/)).toBeTruthy();
  expect(screen.queryByRole('button', { name: 'SAVE' })).toBeNull();
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
