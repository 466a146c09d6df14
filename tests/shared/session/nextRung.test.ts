import type { RungRow, RunView } from '@/shared/schema/views';
import { newRun } from '@/shared/session/startSession';
import { nextPort, proposeRun } from '@/shared/session/nextPort';
import { nextRung, rungsByLift } from '@/shared/session/nextRung';
import { newId, readingFields } from '../../factories/records';

const stored = { version: 1, mark: 'onDevice' as const };
const rung = (liftText: string, rungOrdinal: number, isSkipped = false): RungRow => ({
  ...stored,
  id: newId(),
  runId: newId(),
  rungOrdinal,
  liftText,
  liftUnit: 'in',
  isSkipped,
});
function runOf(rungs: RungRow[], keyed: RungRow[], pass: 'up' | 'down' = 'up'): RunView {
  const run = newRun({ sessionId: newId(), runOrdinal: 1, side: 'intake', port: '1', valvesOpenCount: 1 });
  return {
    run: { ...run, ...stored, id: newId(), pass },
    rungs,
    readings: keyed.map(({ id }) => ({ ...stored, id: newId(), ...readingFields({ rungId: id }) })),
  };
}

describe('the next lift', () => {
  const [low, mid, high] = [rung('0.100', 1), rung('0.200', 2), rung('0.300', 3)] as const;
  it('is the one above, in an up pass', () => {
    expect(nextRung(runOf([low, mid, high], [low]), low.id)).toBe(mid);
  });
  it('is the one below, in a down pass', () => {
    expect(nextRung(runOf([low, mid, high], [high], 'down'), high.id)).toBe(mid);
  });
  it('leaves out what is skipped, and what was keyed a moment ago', () => {
    const skipped = rung('0.250', 4, true);
    expect(nextRung(runOf([low, mid, skipped, high], []), low.id, [low.id, mid.id])).toBe(high);
  });
  it('goes back to what was left out once the top is reached', () => {
    expect(nextRung(runOf([low, mid, high], [mid]), high.id, [high.id])).toBe(low);
  });
  it('is none when every lift is keyed or skipped', () => {
    expect(nextRung(runOf([low, rung('0.2', 2, true)], [low]), low.id)).toBeNull();
  });
  it('counts a reading that is not to be used as none', () => {
    const run = runOf([low], [low]);
    const unused = { ...run, readings: run.readings.map((reading) => ({ ...reading, isUsed: false })) };
    expect(nextRung(unused, null)).toBe(low);
  });
});

it('puts a lift that was added later in its place among the others', () => {
  const lifts = [rung('0.1', 1), rung('0.10', 2), rung('0.3', 3), rung('0.15', 4)];
  expect(rungsByLift(lifts).map((each) => each.liftText)).toEqual(['0.1', '0.10', '0.15', '0.3']);
});
it('keeps the order of the plan when units are mixed', () => {
  const lifts = [rung('0.3', 1), { ...rung('2', 2), liftUnit: 'mm' as const }];
  expect(rungsByLift(lifts).map((each) => each.liftText)).toEqual(['0.3', '2']);
});

describe('the next port', () => {
  const ports = (['intake', 'exhaust'] as const).flatMap((side) =>
    ['1', '2'].map((port) => ({ side, port })),
  );
  const headOf = { intakeValveCount: 2, exhaustValveCount: 1, ports };
  const sessionWith = (run: { side: 'intake' | 'exhaust'; port: string }[]) => ({
    head: headOf as Parameters<typeof nextPort>[0]['head'],
    runs: run.map((name) => {
      const view = runOf([], []);
      return { ...view, run: { ...view.run, ...name, valvesOpenCount: 1 } };
    }),
  });
  it('is intake 1 at first and then follows the ports of the side', () => {
    expect(nextPort(sessionWith([]))).toEqual({ side: 'intake', port: '1' });
    expect(nextPort(sessionWith([{ side: 'intake', port: '1' }]))).toEqual({ side: 'intake', port: '2' });
  });
  it('goes on with the exhaust when every intake has a run', () => {
    const done = [
      { side: 'intake' as const, port: '1' },
      { side: 'intake' as const, port: '2' },
    ];
    expect(nextPort(sessionWith(done))).toEqual({ side: 'exhaust', port: '1' });
  });
  it('stays on the side that is being run, and comes back to what was left out', () => {
    const exhaust = { side: 'exhaust' as const, port: '1' };
    expect(nextPort(sessionWith([exhaust]))).toEqual({ side: 'exhaust', port: '2' });
    expect(nextPort(sessionWith([exhaust, { side: 'exhaust', port: '2' }]))).toEqual({
      side: 'intake',
      port: '1',
    });
  });
  it('offers a port once more when all have a run', () => {
    expect(nextPort(sessionWith(ports))).toEqual({ side: 'intake', port: '1' });
  });
  it('proposes what the side was run with before, otherwise its usual direction and every valve', () => {
    expect(proposeRun(sessionWith([]), { side: 'exhaust', port: '1' })).toMatchObject({
      direction: 'blowing',
      valvesOpenCount: 1,
    });
    expect(proposeRun(sessionWith([]), { side: 'intake', port: '1' }).valvesOpenCount).toBe(2);
    const before = sessionWith([{ side: 'intake', port: '1' }]);
    expect(proposeRun(before, { side: 'intake', port: '2' }).valvesOpenCount).toBe(1);
  });
});
