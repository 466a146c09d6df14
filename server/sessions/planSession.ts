import { AppError } from '@/shared/errors';
import { PlanSessionRequest } from '@/shared/schema/api';
import { Calibration, type Session } from '@/shared/schema/records';
import { sessionSettings } from '@/shared/session/startSession';
import { shops } from '@/db/server/schema/shops';
import { withChanges } from '@/db/server/sync/applyChanges';
import { readRows } from '@/db/server/sync/readRows';
import type { ShopTx } from '@/db/server/transaction';
import type { PersonCtx } from '../ctx';
import { need } from '../access';
import { atDesk, deskBatch } from '../changes/atDesk';
import { parse } from '../http/parse';

/** Plans a session at the desk, with the shop's and the bench's settings copied in. Its number is counted under the
 * shop's lock. Asked twice with the same id, it is planned once.
 * @throws AppError `not_allowed`, `no_such_record` when stage or bench are not the shop's
 */
export async function planSession(ctx: PersonCtx, raw: unknown): Promise<{ id: string; label: string }> {
  need(ctx, 'planSession');
  const request = parse(PlanSessionRequest, raw);
  return withChanges(ctx.db, ctx.actor.shopId, async (tx, apply) => {
    const [planned] = await readRows(tx, 'sessions', 'id', [request.id]);
    if (planned) return { id: planned.id, label: String(planned.fields.label) };
    const session = await newSession(ctx, tx, request);
    const change = atDesk(ctx, {
      id: ctx.newId(),
      kind: 'create',
      table: 'sessions',
      rid: request.id,
      base: {},
      set: session,
    });
    const [verdict] = await apply(deskBatch(ctx), [change]);
    // what does not apply leaves no trace: it was no change of a device that could be asked about it
    if (verdict?.verdict !== 'applied') throw new AppError('no_such_record');
    return { id: request.id, label: session.label };
  });
}

async function newSession(ctx: PersonCtx, tx: ShopTx, request: PlanSessionRequest): Promise<Session> {
  const [shop] = await tx.orm.select({ settings: shops.settings }).from(shops);
  if (!shop) throw new AppError('no_such_record');
  const calibrations = await readRows(tx, 'calibrations', 'benchId', [request.benchId]);
  return {
    stageId: request.stageId,
    benchId: request.benchId,
    label: await nextLabel(tx),
    state: 'open',
    settings: sessionSettings(
      shop.settings,
      { text: request.standardPressureText, unit: request.standardPressureUnit },
      calibrations
        .filter((row) => !row.deleted)
        .map((row) => ({ id: row.id, ...Calibration.parse(row.fields) })),
      request.benchId,
      ctx.clock().toISOString(),
    ),
    liftPlan: request.liftPlan,
    plannedBy: ctx.actor.id,
    note: request.note,
  };
}

/** The next number of the desk: 0, a dash, a count. */
async function nextLabel(tx: ShopTx): Promise<string> {
  const { rows } = await tx.client.query<{ highest: number }>(
    `select coalesce(max(split_part(label, '-', 2)::int), 0) as highest from sessions where label like '0-%'`,
  );
  return `0-${String((rows[0]?.highest ?? 0) + 1).padStart(3, '0')}`;
}
