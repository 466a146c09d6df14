import { v7 } from 'uuid';
import { setFact } from '@/db/device/meta';
import { prepareDeviceDb } from '@/db/device/prepareDb';
import { record } from '@/db/device/recordChange';
import { setBenchDevice } from '@/stores/bench/benchDevice';
import { addRun, saveReading } from '@/stores/bench/verbs';
import { sessionFields } from '../factories/records';
import { benchFields, customerFields, headFields, stageFields } from '../factories/shopRecords';
import { line, median, quantile, timed } from './figures';
import { openSqlJs } from './sqlJsDriver';

const rounds = 600;

/** Saving a reading (reading, outbox, working row, draft in one commit) against a bare one-row insert of the same size
 * through the same driver. In memory: what is compared is our work, not the disk's. */
export async function saveBench(): Promise<void> {
  const driver = await openSqlJs();
  const db = await prepareDeviceDb(driver);
  const person = v7();
  const author = { personId: person, atIso: new Date().toISOString() };
  const ids = { customer: v7(), head: v7(), stage: v7(), bench: v7(), session: v7() };
  await db.tx(async (tx) => {
    await setFact(tx, 'device', { id: v7(), deviceOrdinal: 1, name: 'bench' });
    await record(
      tx,
      [
        { kind: 'create', table: 'customers', rid: ids.customer, set: customerFields('alder') },
        { kind: 'create', table: 'heads', rid: ids.head, set: headFields('alder', ids.customer) },
        { kind: 'create', table: 'stages', rid: ids.stage, set: stageFields('alder', ids.head) },
        { kind: 'create', table: 'benches', rid: ids.bench, set: benchFields('alder') },
        {
          kind: 'create',
          table: 'sessions',
          rid: ids.session,
          set: sessionFields({ stageId: ids.stage, benchId: ids.bench, plannedBy: person }),
        },
      ],
      author,
    );
  });
  setBenchDevice({ db, nowMs: Date.now, personId: () => person, onRecorded: () => undefined });
  const runId = await addRun({ sessionId: ids.session, side: 'intake', port: '1' });
  await driver.exec('create table bare (id text primary key, body text not null)');
  const body = JSON.stringify({
    liftText: '0.300',
    flowText: '166',
    pressureText: '27.0',
    pad: 'x'.repeat(700),
  });

  const saved: number[] = [];
  const bare: number[] = [];
  for (let i = 0; i < rounds; i += 1) {
    saved.push(
      await timed(() =>
        saveReading({
          runId,
          rungId: null,
          liftText: '0.300',
          liftUnit: 'in',
          flowText: '166',
          pressureText: '27.0',
          isPressureRepeated: false,
          chips: [],
        }),
      ),
    );
    bare.push(await timed(() => db.tx(() => driver.run('insert into bare values (?, ?)', [v7(), body]))));
  }
  setBenchDevice(null);
  await db.close();
  const late = median(saved.slice(-100)) / median(saved.slice(50, 150));
  line(
    'saving a reading against a bare insert, no disk',
    median(saved) / median(bare),
    '',
    `p50 ${median(saved).toFixed(2)} ms, p95 ${quantile(saved, 0.95).toFixed(2)} ms against ${median(bare).toFixed(2)} ms`,
  );
  line('the last hundred of 600 against the first', late, 'aim about 1', '');
}
