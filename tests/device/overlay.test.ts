import { overlay, type QueuedChange } from '@/db/device/overlay';
import type { Change, Fields, Verdict } from '@/shared/sync/protocol';
import { changeOf, readingFields, rowOf } from '../factories/records';

const base = readingFields();
const copyOf = (over: Partial<typeof base> = {}, version = 1) => rowOf({ ...base, ...over }, { version });
const queued = (
  over: Partial<Change>,
  verdict: Verdict | null = null,
  appliedVersion: number | null = null,
): QueuedChange => ({ change: changeOf(over), verdict, appliedVersion });
const reflow = (from: string, to: string, verdict: Verdict | null = null, version: number | null = null) =>
  queued({ kind: 'patch', base: { flowText: from }, set: { flowText: to } }, verdict, version);
const create = (verdict: Verdict | null = null, version: number | null = null) =>
  queued({ kind: 'create', set: base, by: base.byPersonId }, verdict, version);
const shown = (copy: Parameters<typeof overlay>[0], list: QueuedChange[]) => {
  const seen = overlay(copy, list);
  return seen && [(seen.row.fields as Fields).flowText, seen.mark, seen.row.deleted];
};

it('shows the server’s copy as sent when nothing waits', () => {
  expect(shown(copyOf(), [])).toEqual(['166', 'sent', false]);
});

it('lays waiting changes over the copy, each over the one before', () => {
  expect(shown(copyOf(), [reflow('166', '170'), reflow('170', '171')])).toEqual(['171', 'onDevice', false]);
});

it('keeps an applied value while the feed has not brought its version', () => {
  expect(shown(copyOf({}, 1), [reflow('166', '170', 'applied', 2)])).toEqual(['170', 'sent', false]);
});

it('trusts the copy once the feed has brought the version', () => {
  expect(shown(copyOf({ flowText: '181' }, 3), [reflow('166', '170', 'applied', 2)])).toEqual([
    '181',
    'sent',
    false,
  ]);
});

it.each([
  ['dispute', 'dispute'],
  ['held', 'held'],
  ['rejected', 'setAside'],
] as const)('shows the copy with its mark when a patch was answered %s', (verdict, mark) => {
  expect(shown(copyOf({ flowText: '150' }, 2), [reflow('166', '170', verdict)])).toEqual([
    '150',
    mark,
    false,
  ]);
});

it.each([
  ['held', 'held'],
  ['rejected', 'setAside'],
] as const)('never takes a created reading off the screen because it was %s', (verdict, mark) => {
  expect(shown(null, [create(verdict)])).toEqual(['166', mark, false]);
  expect(shown(null, [create(verdict), reflow('166', '170', verdict)])).toEqual(['170', mark, false]);
});

it('takes an undone reading off the screen, also when its create was refused', () => {
  const undo = queued({ kind: 'delete', base: { flowText: '166' } });
  expect(shown(null, [create('rejected'), undo])).toEqual(['166', 'onDevice', true]);
  expect(shown(null, [create(), undo])).toEqual(['166', 'onDevice', true]);
});

it('forgets a refusal that a later applied change of the same value made good', () => {
  const list = [reflow('166', '170', 'dispute'), reflow('150', '170', 'applied', 3)];
  expect(shown(copyOf({ flowText: '170' }, 3), list)).toEqual(['170', 'sent', false]);
});

it('keeps the mark of a refusal when a later change was about something else', () => {
  const chips = queued({ kind: 'patch', base: { chips: [] }, set: { chips: ['loud'] } }, 'applied', 3);
  expect(shown(copyOf({ flowText: '150' }, 3), [reflow('166', '170', 'dispute'), chips])).toEqual([
    '150',
    'dispute',
    false,
  ]);
});

it('shows nothing for a patch of a record that nobody has', () => {
  expect(shown(null, [reflow('166', '170')])).toBeNull();
});
