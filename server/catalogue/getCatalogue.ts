import { Catalogue } from '@/shared/schema/views';
import { readMarks, viewOf } from '@/db/server/sync/marks';
import { readAll } from '@/db/server/sync/readRows';
import { withShop } from '@/db/server/transaction';
import type { PersonCtx } from '../ctx';

/** Every customer, head, stage and bench of the shop. */
export async function getCatalogue(ctx: PersonCtx): Promise<Catalogue> {
  return withShop(ctx.db, ctx.actor.shopId, async (tx) => {
    const customers = await readAll(tx, 'customers');
    const heads = await readAll(tx, 'heads');
    const stages = await readAll(tx, 'stages');
    const benches = await readAll(tx, 'benches');
    const marks = await readMarks(tx, [...customers, ...heads, ...stages, ...benches]);
    return Catalogue.parse({
      customers: customers.map((row) => viewOf(row, marks)),
      heads: heads.map((row) => viewOf(row, marks)),
      stages: stages.map((row) => viewOf(row, marks)),
      benches: benches.map((row) => viewOf(row, marks)),
    });
  });
}
