import fc from 'fast-check';
import { canonical, merge, type Row } from '@/shared/sync/merge';
import type { Fields } from '@/shared/sync/protocol';
import { changeOf, newId, openGuard, readingFields, rowOf, sessionFields } from '@/tests/factories/records';

const fields = () => readingFields() as unknown as Fields;

describe('a patch', () => {
  it('is applied when the record still holds what its author saw', () => {
    const row = rowOf(fields());
    const done = merge(
      row,
      changeOf({ base: { flowText: '166', flowUnit: 'cfm' }, set: { flowText: '161', flowUnit: 'cfm' } }),
      openGuard,
    );
    expect(done.verdict).toBe('applied');
    expect(done.row).toMatchObject({ version: 2, fields: { flowText: '161', liftText: '0.300' } });
  });

  it('becomes a dispute with both values when somebody changed the same field unseen', () => {
    const row = rowOf({ ...fields(), flowText: '170' }, { version: 2 });
    const done = merge(row, changeOf({ base: { flowText: '166' }, set: { flowText: '161' } }), openGuard);
    expect(done).toMatchObject({ verdict: 'dispute', why: 'differs' });
    expect(done.row).toBe(row);
    expect(done.disputes).toEqual([
      { group: 'flow', base: { flowText: '166' }, theirs: { flowText: '170' }, mine: { flowText: '161' } },
    ]);
  });

  it('treats a value and its unit as one field', () => {
    const row = rowOf({ ...fields(), liftUnit: 'mm' }, { version: 2 });
    const done = merge(
      row,
      changeOf({ base: { liftText: '0.300', liftUnit: 'in' }, set: { liftText: '0.350', liftUnit: 'in' } }),
      openGuard,
    );
    expect(done.verdict).toBe('dispute');
    expect(done.row?.fields).toMatchObject({ liftText: '0.300', liftUnit: 'mm' });
  });

  it('merges the fields that nobody else touched, and disputes only the others', () => {
    const row = rowOf({ ...fields(), flowText: '170' }, { version: 2 });
    const done = merge(
      row,
      changeOf({ base: { flowText: '166', isUsed: true }, set: { flowText: '161', isUsed: false } }),
      openGuard,
    );
    expect(done.verdict).toBe('dispute');
    expect(done.row).toMatchObject({ version: 3, fields: { flowText: '170', isUsed: false } });
  });

  it('is nothing to do when both made the same change', () => {
    const row = rowOf({ ...fields(), flowText: '161' }, { version: 2 });
    const done = merge(row, changeOf({ base: { flowText: '166' }, set: { flowText: '161' } }), openGuard);
    expect(done).toMatchObject({ verdict: 'applied', disputes: [] });
    expect(done.row).toBe(row);
  });

  it('of a deleted record is a dispute about the deletion', () => {
    const row = rowOf(fields(), { deleted: true, version: 2 });
    expect(
      merge(row, changeOf({ base: { flowText: '166' }, set: { flowText: '161' } }), openGuard),
    ).toMatchObject({
      verdict: 'dispute',
      why: 'deleted_meanwhile',
      disputes: [{ group: 'deleted', mine: { flowText: '161' } }],
    });
  });

  it.each([
    ['a value that is not one number', { flowText: '1.2.3' }, 'invalid'],
    ['an absurdly long value', { flowText: '1234567890123' }, 'invalid'],
    ['a missing flow', { flowText: null }, 'invalid'],
    ['a field that does not exist', { horses: '300' }, 'invalid'],
    ['the run a reading belongs to', { runId: newId() }, 'fixed_field'],
  ])('is refused for %s', (_what, set, why) => {
    const row = rowOf(fields());
    const done = merge(row, changeOf({ set: set as Fields }), openGuard);
    expect(done).toMatchObject({ verdict: 'rejected', why });
    expect(done.row).toBe(row);
  });
});

describe('a create', () => {
  const by = newId();
  const mine = () => readingFields({ byPersonId: by }) as unknown as Fields;

  it('is stored as version 1', () => {
    expect(merge(null, changeOf({ kind: 'create', by, set: mine() }), openGuard)).toMatchObject({
      verdict: 'applied',
      row: { version: 1, deleted: false },
    });
  });

  it('with the same content again is nothing to do, with other content is set aside', () => {
    const set = mine();
    const row = rowOf(set);
    expect(merge(row, changeOf({ kind: 'create', by, set }), openGuard)).toMatchObject({
      verdict: 'applied',
    });
    expect(
      merge(row, changeOf({ kind: 'create', by, set: { ...set, flowText: '9' } }), openGuard),
    ).toMatchObject({
      verdict: 'rejected',
      why: 'exists_differently',
    });
  });

  it.each(['handedIn', 'approved'] as const)('into a session that is %s is held', (sessionState) => {
    const done = merge(null, changeOf({ kind: 'create', by, set: mine() }), { ...openGuard, sessionState });
    expect(done).toMatchObject({ verdict: 'held', why: 'session_closed', row: null });
  });

  it.each([
    ['unknown', 'rejected', 'unknown_parent'],
    ['rejected', 'rejected', 'parent_rejected'],
    ['held', 'held', 'parent_held'],
  ] as const)('under a parent that is %s is %s', (parent, verdict, why) => {
    expect(
      merge(null, changeOf({ kind: 'create', by, set: mine() }), { ...openGuard, parent }),
    ).toMatchObject({ verdict, why });
  });

  it.each(['account_closed', 'device_revoked'] as const)('is held when %s', (standing) => {
    expect(
      merge(null, changeOf({ kind: 'create', by, set: mine() }), { ...openGuard, standing }),
    ).toMatchObject({
      verdict: 'held',
      why: standing,
    });
  });

  it('of a bench never comes from a device', () => {
    expect(merge(null, changeOf({ kind: 'create', table: 'benches' }), openGuard)).toMatchObject({
      why: 'not_by_device',
    });
  });

  it('names the person who made the change as the one who keyed', () => {
    expect(merge(null, changeOf({ kind: 'create', by: newId(), set: mine() }), openGuard)).toMatchObject({
      why: 'invalid',
    });
  });

  it('from a newer version, or of an unknown table, is set aside with its reason', () => {
    expect(merge(null, changeOf({ kind: 'create', sv: 999, set: mine() }), openGuard)).toMatchObject({
      why: 'newer_version',
    });
    expect(merge(null, changeOf({ kind: 'create', table: 'gaskets' }), openGuard)).toMatchObject({
      why: 'unknown_table',
    });
  });
});

describe('handing in', () => {
  const row = () => rowOf(sessionFields() as unknown as Fields);
  const change = changeOf({ kind: 'handIn', table: 'sessions', expect: [] });

  it('is done while the readings are the ones the person saw, and once', () => {
    const done = merge(row(), change, openGuard);
    expect(done).toMatchObject({ verdict: 'applied', row: { version: 2, fields: { state: 'handedIn' } } });
    expect(merge(done.row, change, { ...openGuard, sessionState: 'handedIn' })).toMatchObject({
      verdict: 'applied',
    });
  });

  it('does nothing when the session changed since', () => {
    const before = row();
    const done = merge(before, change, { ...openGuard, isSeenCurrent: false });
    expect(done).toMatchObject({ verdict: 'rejected', why: 'changed_since_seen' });
    expect(done.row).toBe(before);
  });

  it('cannot be smuggled in as a patch of the state', () => {
    expect(
      merge(
        row(),
        changeOf({ table: 'sessions', base: { state: 'open' }, set: { state: 'approved' } }),
        openGuard,
      ),
    ).toMatchObject({ verdict: 'rejected', why: 'fixed_field' });
  });
});

describe('for any two writers', () => {
  const value = fc.constantFrom('10', '20', '30', '241,5');
  const field = fc.constantFrom('flowText', 'pressureText', 'liftText');
  const edits = fc.array(fc.tuple(field, value), { maxLength: 8 });

  /** a person's own chain: each change carries what the one before left */
  function chain(from: Row, list: [string, string][]) {
    let seen = from.fields;
    return list.map(([name, to]) => {
      const change = changeOf({ rid: from.id, base: { [name]: seen[name] ?? null }, set: { [name]: to } });
      seen = { ...seen, [name]: to };
      return change;
    });
  }

  it('an own chain never disputes with itself', () => {
    fc.assert(
      fc.property(edits, (list) => {
        let row: Row | null = rowOf(fields());
        for (const change of chain(row, list)) {
          const done = merge(row, change, openGuard);
          expect(done.verdict).toBe('applied');
          row = done.row;
        }
      }),
    );
  });

  it('no value is overwritten unseen and none vanishes', () => {
    fc.assert(
      fc.property(edits, edits, (first, second) => {
        const start = rowOf(fields());
        let row: Row | null = start;
        for (const change of chain(start, first)) row = merge(row, change, openGuard).row;
        for (const change of chain(start, second)) {
          const before: Row | null = row;
          const done = merge(row, change, openGuard);
          const [name] = Object.keys(change.set) as [string];
          const now = done.row?.fields[name];
          if (canonical(now) !== canonical(change.set[name]))
            expect(done.disputes).toMatchObject([
              { mine: { [name]: change.set[name] }, theirs: { [name]: now } },
            ]);
          else if (canonical(before?.fields[name]) !== canonical(now))
            expect(canonical(before?.fields[name])).toBe(canonical(change.base[name]));
          row = done.row;
        }
      }),
    );
  });

  it('the same change again changes nothing more', () => {
    fc.assert(
      fc.property(edits, (list) => {
        let row: Row | null = rowOf(fields());
        for (const change of chain(row, list)) {
          const once = merge(row, change, openGuard);
          const twice = merge(once.row, change, openGuard);
          expect(canonical(twice.row?.fields)).toBe(canonical(once.row?.fields));
          expect(twice.row?.version).toBe(once.row?.version);
          row = once.row;
        }
      }),
    );
  });
});
