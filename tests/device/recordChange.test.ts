import { eq } from 'drizzle-orm';
import { prepareDeviceDb } from '@/db/device/prepareDb';
import { record } from '@/db/device/recordChange';
import { outbox } from '@/db/device/schema/deviceTables';
import { readings } from '@/db/device/schema/working';
import { freshFile, openNodeSqlite } from '../factories/nodeSqlite';
import { newId, readingFields } from '../factories/records';

const at = '2026-12-01T10:00:00.000Z';

it('keeps a recorded reading and its place in the queue when the connection is lost after the commit', async () => {
  const file = freshFile();
  const person = newId();
  const rid = newId();
  const db = await prepareDeviceDb(await openNodeSqlite(file));
  await db.tx((tx) =>
    record(tx, [{ kind: 'create', table: 'readings', rid, set: readingFields({ byPersonId: person }) }], {
      personId: person,
      atIso: at,
    }),
  );
  const again = await prepareDeviceDb(await openNodeSqlite(file));
  const [row] = await again.read.select().from(readings).where(eq(readings.id, rid));
  expect(row).toMatchObject({ flowText: '166', mark: 'onDevice', version: 0, chips: [], isUsed: true });
  expect(await again.read.select({ n: outbox.n }).from(outbox)).toEqual([{ n: 1 }]);
});
