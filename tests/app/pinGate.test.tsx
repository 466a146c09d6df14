import { act, configure, fireEvent, render, screen } from '@testing-library/react';
import { PinGate, type PinAnswer } from '@/components/bench/PinGate';

// computing what is hidden for every role takes most of the time in jsdom, and a loaded machine needs patience
configure({ defaultHidden: true, asyncUtilTimeout: 10_000 });

const people = [
  { id: 'a', name: 'Ada Fell', hasPin: true },
  { id: 'b', name: 'Bo Marsh', hasPin: false },
];

function gate(answer: (personId: string, pin: string) => Promise<PinAnswer>) {
  const onUnlock = jest.fn(answer);
  render(<PinGate shopName="Fell & Daughter" people={people} onUnlock={onUnlock} />);
  return onUnlock;
}
const pressName = (name: string) => fireEvent.click(screen.getByRole('button', { name }), { detail: 0 });
/** Keys act when they go down. */
async function keyIn(pin: string) {
  for (const digit of pin)
    await act(async () => {
      fireEvent.pointerDown(screen.getByRole('button', { name: digit }));
      fireEvent.pointerUp(screen.getByRole('button', { name: digit }));
    });
}

it('asks for a name, then takes six digits and sends them by themselves', async () => {
  const onUnlock = gate(async () => ({ ok: true }));
  pressName('Ada Fell');
  await keyIn('12345');
  expect(onUnlock).not.toHaveBeenCalled();
  await keyIn('6');
  expect(onUnlock).toHaveBeenCalledWith('a', '123456');
});

it('takes a hardware keyboard and backspace', async () => {
  const onUnlock = gate(async () => ({ ok: true }));
  pressName('Ada Fell');
  for (const key of ['1', '9', 'Backspace', '2', '3', '4', '5', '6'])
    await act(async () => void fireEvent.keyDown(window, { key }));
  expect(onUnlock).toHaveBeenCalledWith('a', '123456');
});

it('never shows the digits', async () => {
  gate(async () => ({ ok: true }));
  pressName('Ada Fell');
  await keyIn('42');
  expect(screen.getByRole('img', { name: '2 of 6 digits keyed' })).toBeTruthy();
  expect(screen.queryByText('42')).toBeNull();
});

it('a wrong PIN is told without saying what was wrong, and the fields are empty again', async () => {
  gate(async () => ({ wrong: true }));
  pressName('Ada Fell');
  await keyIn('000000');
  expect(screen.getByRole('alert').textContent).toMatch(/did not match/);
  expect(screen.getByRole('img', { name: '0 of 6 digits keyed' })).toBeTruthy();
});

it('too many tries lock the pad while the seconds run down', async () => {
  jest.useFakeTimers();
  try {
    const onUnlock = gate(async () => ({ waitSeconds: 3 }));
    pressName('Ada Fell');
    await keyIn('000000');
    expect(screen.getByText(/again in 3 s/)).toBeTruthy();
    await keyIn('1');
    expect(screen.getByRole('img', { name: '0 of 6 digits keyed' })).toBeTruthy();
    await act(async () => void jest.advanceTimersByTime(1500));
    expect(screen.getByText(/again in 2 s/)).toBeTruthy();
    await act(async () => void jest.advanceTimersByTime(2000));
    expect(screen.queryByText(/again in/)).toBeNull();
    await keyIn('111111');
    expect(onUnlock).toHaveBeenCalledTimes(2);
  } finally {
    jest.useRealTimers();
  }
});

it('a device that cannot look says so and keeps the pad open', async () => {
  gate(() => Promise.reject(new Error('This device could not look.')));
  pressName('Ada Fell');
  await keyIn('123456');
  expect(screen.getByRole('alert').textContent).toMatch(/could not look/);
  expect(screen.getByRole('button', { name: '1' }).getAttribute('aria-disabled')).toBeNull();
});

it('says of whom no PIN is known where it is set', () => {
  gate(async () => ({ ok: true }));
  expect(screen.getByRole('button', { name: 'Bo Marsh' }).getAttribute('aria-disabled')).toBe('true');
  expect(screen.getByText(/No PIN yet for Bo Marsh/)).toBeTruthy();
});
