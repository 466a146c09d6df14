import { fireEvent, render, screen, within } from '@testing-library/react';
import { SessionDetail } from '@/components/session/SessionDetail';
import { correctReading } from '@/shared/flow/correctReading';
import type { Mark } from '@/shared/schema/views';
import { newId } from '../factories/records';
import { readingRow, sessionView } from '../factories/deskViews';

const person = { id: newId(), name: 'Odd Sommer' };
const cells = (row: HTMLElement) =>
  within(row)
    .getAllByRole('cell')
    .map((cell) => cell.textContent?.trim());
const bodyRows = () => screen.getAllByRole('row').slice(1);

test('a reading stands in the table to the letter as it was keyed', () => {
  const reading = readingRow({
    liftText: '0.0500',
    flowText: '031.0',
    pressureText: '29',
    byPersonId: person.id,
    chips: ['breaksAway'],
  });
  render(<SessionDetail view={sessionView([reading], {}, [person])} />);
  const [row] = bodyRows();
  const [lift, flow, pressure, corrected, notes, by, mark] = cells(row!);
  expect([lift, flow, pressure]).toEqual(['0.0500', '031.0', '29']);
  expect(corrected).toBe('30.5');
  expect(notes).toBe('breaks away');
  expect(by).toContain('Odd Sommer');
  expect(mark).toBe('sent');
});

test('a comma shop reads commas: keyed texts stay, figures carry its mark', () => {
  const reading = readingRow({ liftText: '7,5', liftUnit: 'mm', flowText: '241,5', pressureText: '28' });
  render(<SessionDetail view={sessionView([reading], { decimalMark: ',' })} />);
  expect(cells(bodyRows()[0]!).slice(0, 4)).toEqual(['7,5', '241,5', '28', '241,5']);
});

test('decimal marks stand under one another', () => {
  const readings = [readingRow({ flowText: '31' }), readingRow({ flowText: '129.25' })];
  render(<SessionDetail view={sessionView(readings)} />);
  const texts = bodyRows().map((row) => within(row).getAllByRole('cell')[1]!.textContent!);
  expect(texts[0]!.length - '31'.length).toBe('.25'.length);
  expect(texts[1]).toBe('129.25');
});

test('units that differ within a run are said in each cell', () => {
  const readings = [
    readingRow({ flowUnit: 'cfm', flowText: '100' }),
    readingRow({ flowUnit: 'L/s', flowText: '47' }),
  ];
  render(<SessionDetail view={sessionView(readings)} />);
  expect(bodyRows().map((row) => cells(row)[1])).toEqual(['100 cfm', '47 L/s']);
});

const marks: [Mark, string][] = [
  ['onDevice', 'on this device'],
  ['sent', 'sent'],
  ['dispute', 'in dispute'],
  ['held', 'held'],
  ['setAside', 'set aside'],
];
test.each(marks)('the mark %s is said in words', (mark, word) => {
  render(<SessionDetail view={sessionView([readingRow({ mark })])} />);
  expect(cells(bodyRows()[0]!).at(-1)).toBe(word);
});

test('pressing the corrected flow opens its working, step by step', () => {
  const view = sessionView([readingRow({ flowText: '166', pressureText: '27.0', liftText: '0.300' })]);
  render(<SessionDetail view={view} />);
  fireEvent.click(screen.getByRole('button', { name: /Working of 169.0 cfm at lift 0.300 in/ }));
  const dialog = screen.getByRole('dialog');
  const steps = correctReading(view.runs[0]!.readings[0]!, view.session.settings, 'drawing')!.working;
  expect(steps.length).toBeGreaterThan(2);
  for (const step of steps) expect(dialog.textContent).toContain(step.sentence);
});

test('a reading without a test pressure is kept and says why it is not corrected', () => {
  render(<SessionDetail view={sessionView([readingRow({ pressureText: '0' })])} />);
  fireEvent.click(screen.getByRole('button', { name: /Why the reading at lift 0.300 in is not corrected/ }));
  expect(screen.getByRole('dialog').textContent).toContain('The keyed values stay.');
});

test('repeats, pressures by key and readings not to be used are noted', () => {
  const rungId = newId();
  const readings = [
    readingRow({ rungId }),
    readingRow({ rungId, isPressureRepeated: true, isUsed: false, notUsedWhy: 'valve slipped' }),
  ];
  render(<SessionDetail view={sessionView(readings)} />);
  expect(bodyRows().map((row) => cells(row)[4])).toEqual([
    '',
    'not used: valve slipped, repeat 1, pressure by key',
  ]);
});

test('a reading that comes in while somebody looks is marked as new, those before it are not', () => {
  const first = readingRow({ flowText: '31' });
  const view = sessionView([first]);
  const { rerender } = render(<SessionDetail view={view} />);
  expect(screen.queryByText('new')).toBeNull();
  const [run] = view.runs;
  rerender(
    <SessionDetail
      view={{ ...view, runs: [{ ...run!, readings: [first, readingRow({ flowText: '60' })] }] }}
    />,
  );
  expect(bodyRows().map((row) => cells(row).at(-1))).toEqual(['sent', 'sentnew']);
  expect(screen.getByText('1 new reading')).toBeTruthy();
});

test('without a calibration the head of the session says that figures compare on this bench only', () => {
  render(<SessionDetail view={sessionView([])} />);
  expect(screen.getByText(/figures compare on this bench only/)).toBeTruthy();
  expect(screen.getByText(/No reading yet/)).toBeTruthy();
});
