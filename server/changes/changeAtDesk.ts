import { may, type Act } from '@/shared/access';
import { AppError } from '@/shared/errors';
import { DeskChangesRequest } from '@/shared/schema/api';
import type { Change, VerdictOf } from '@/shared/sync/protocol';
import { isSyncTable, syncTables, type SyncTable } from '@/shared/sync/syncTables';
import { readVerdicts, withChanges } from '@/db/server/sync/applyChanges';
import { stateOf } from '@/db/server/sync/judgeChanges';
import { look } from '@/db/server/sync/look';
import { need } from '../access';
import type { PersonCtx } from '../ctx';
import { parse } from '../http/parse';
import { atDesk, deskBatch } from './atDesk';

const actOf: Record<SyncTable, Act> = {
  customers: 'keyAndPlan',
  heads: 'keyAndPlan',
  stages: 'keyAndPlan',
  portDimensions: 'keyAndPlan',
  sessions: 'keyAndPlan',
  runs: 'keyAndPlan',
  rungs: 'keyAndPlan',
  readings: 'keyAndPlan',
  benches: 'changeBench',
  calibrations: 'adoptCalibration',
};

/** Changes made at the desk. They meet the same merge as those of devices and are logged with no device.
 * @throws AppError `not_allowed` or `state_forbids` when one of them may not be done: then none is
 */
export async function changeAtDesk(ctx: PersonCtx, raw: unknown): Promise<{ verdicts: VerdictOf[] }> {
  const { changes } = parse(DeskChangesRequest, raw);
  const incoming = changes.map((change) => atDesk(ctx, change));
  for (const { change } of incoming) if (change) refuseByRole(ctx, change);
  return withChanges(ctx.db, ctx.actor.shopId, async (tx, apply) => {
    const known = await readVerdicts(
      tx,
      incoming.map((one) => one.id),
    );
    const fresh = [...new Map(incoming.map((one) => [one.id, one])).values()].filter(
      (one) => !known.has(one.id),
    );
    const read = fresh.flatMap(({ change }) => (change ? [change] : []));
    const { records } = await look(tx, read);
    for (const change of read) {
      if (!isSyncTable(change.table)) continue;
      const before = records.get(change.table, change.rid);
      const state = stateOf(change.table, change, before, records);
      if (!isCorrection(change) || !may(ctx.actor.roles, 'correctReading', state))
        need(ctx, actOf[change.table], state);
    }
    for (const verdict of await apply(deskBatch(ctx), fresh)) known.set(verdict.id, verdict);
    return { verdicts: incoming.flatMap((one) => known.get(one.id) ?? []) };
  });
}

const isCorrection = (change: Change) => change.table === 'readings' && change.kind === 'patch';

/** What can be told without looking at the records. */
function refuseByRole(ctx: PersonCtx, change: Change): void {
  if (!isSyncTable(change.table)) return need(ctx, 'read');
  if (!isCorrection(change) || !may(ctx.actor.roles, 'correctReading')) need(ctx, actOf[change.table]);
  const refuse = (path: string, sentence: string) => {
    throw new AppError('invalid', { fields: [{ path, sentence }] });
  };
  if (change.kind === 'create' && change.table === 'sessions')
    refuse('table', 'a session is planned, so that it gets its number');
  if (change.kind === 'delete' && !syncTables[change.table].deviceMay.includes('delete'))
    refuse('kind', 'a record of this kind is not deleted');
  if (change.kind !== 'create' || change.table !== 'readings') return;
  if (change.set.byPersonId !== ctx.actor.id) refuse('set.byPersonId', 'not the person who is signed in');
  if (change.set.deviceId !== null) refuse('set.deviceId', 'was not keyed on a device');
}
