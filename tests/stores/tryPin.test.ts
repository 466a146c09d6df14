import { hashSync } from 'bcryptjs';
import type { RosterPerson } from '@/shared/schema/records';
import { storeRoster } from '@/db/device/rosterStore';
import { tryPin } from '@/stores/bench/unlockPerson';
import { enrolledDevice, noon, shopSettings, standAtBench } from '../factories/deviceFixture';
import { newId } from '../factories/records';

const ada: RosterPerson = {
  id: newId(),
  name: 'Ada Fell',
  roles: ['operator'],
  pinHash: hashSync('482913', 4),
};
const noPin: RosterPerson = { id: newId(), name: 'Bo Harrow', roles: ['operator'], pinHash: null };

async function atTheDoor() {
  const { db, ids } = await enrolledDevice({ people: [ada, noPin] });
  let now = noon;
  standAtBench(db, null, () => now);
  return {
    db,
    ids,
    wait: (seconds: number) => {
      now += seconds * 1000;
    },
  };
}

it('lets in by the right PIN', async () => {
  await atTheDoor();
  expect(await tryPin(ada.id, '482913')).toEqual({ ok: true });
});

it('answers the same to a wrong PIN, to somebody without a PIN and to nobody at all', async () => {
  await atTheDoor();
  for (const id of [ada.id, noPin.id, newId()]) expect(await tryPin(id, '000000')).toEqual({ wrong: true });
});

it('makes the third wrong try wait 5 s, then 10, 20 … and never more than five minutes', async () => {
  const { wait } = await atTheDoor();
  await tryPin(ada.id, '1');
  await tryPin(ada.id, '2');
  const waits: number[] = [];
  for (let time = 0; time < 8; time += 1) {
    const answer = await tryPin(ada.id, '333333');
    const seconds = 'waitSeconds' in answer ? answer.waitSeconds : 0;
    waits.push(seconds);
    wait(seconds);
  }
  expect(waits).toEqual([5, 10, 20, 40, 80, 160, 300, 300]);
});

it('does not even look at a right PIN while one has to wait, and forgets wrong tries after a right one', async () => {
  const { wait } = await atTheDoor();
  for (const pin of ['1', '2', '3']) await tryPin(ada.id, pin);
  wait(2);
  expect(await tryPin(ada.id, '482913')).toEqual({ waitSeconds: 3 });
  wait(3);
  expect(await tryPin(ada.id, '482913')).toEqual({ ok: true });
  expect(await tryPin(ada.id, '1')).toEqual({ wrong: true });
});

it('locks nobody out for longer than five minutes when the clock was set back', async () => {
  const { wait } = await atTheDoor();
  for (const pin of ['1', '2', '3']) await tryPin(ada.id, pin);
  wait(-30 * 24 * 3600);
  expect(await tryPin(ada.id, '482913')).toEqual({ waitSeconds: 300 });
});

it('keeps wrong tries when the roster comes again, unless the PIN is a new one', async () => {
  const { db, ids } = await atTheDoor();
  for (const pin of ['1', '2', '3']) await tryPin(ada.id, pin);
  const shop = { id: ids.shop, name: 'Fell & Daughter', settings: shopSettings };
  await db.tx((tx) => storeRoster(tx, { shop, people: [ada] }));
  expect(await tryPin(ada.id, '482913')).toEqual({ waitSeconds: 5 });
  await db.tx((tx) => storeRoster(tx, { shop, people: [{ ...ada, pinHash: hashSync('111222', 4) }] }));
  expect(await tryPin(ada.id, '111222')).toEqual({ ok: true });
});

it('lets nobody in who was removed from the shop', async () => {
  const { db, ids } = await atTheDoor();
  const shop = { id: ids.shop, name: 'Fell & Daughter', settings: shopSettings };
  await db.tx((tx) => storeRoster(tx, { shop, people: [noPin] }));
  expect(await tryPin(ada.id, '482913')).toEqual({ wrong: true });
});
