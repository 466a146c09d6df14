import { outbox } from '@/db/device/schema/deviceTables';
import { getFact } from '@/db/device/meta';
import { asc, isNull, ne, or } from 'drizzle-orm';
import { benchDevice } from './benchDevice';

/** A copy of everything the shop has not taken, as a file: a way out when the network, or the disk, will not mend.
 * Nothing on the device changes. */
export async function keepCopyAsFile(): Promise<Blob> {
  const { db, nowMs } = benchDevice();
  const rows = await db.read
    .select()
    .from(outbox)
    .where(or(isNull(outbox.verdict), ne(outbox.verdict, 'applied')))
    .orderBy(asc(outbox.n));
  const device = (await getFact(db.read, 'device')) ?? null;
  const shop = (await getFact(db.read, 'shop')) ?? null;
  const copy = {
    format: 'inchwater-unsent-1',
    writtenAt: new Date(nowMs()).toISOString(),
    device,
    shop: shop && { id: shop.id, name: shop.name },
    changes: rows.map(({ change, n, verdict, why, detail, recordedAt }) => ({
      ...change,
      n,
      recordedAt,
      verdict,
      why,
      detail,
    })),
  };
  return new Blob([JSON.stringify(copy, null, 1)], { type: 'application/json' });
}
