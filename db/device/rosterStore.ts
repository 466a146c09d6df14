import { and, asc, eq, notInArray, sql } from 'drizzle-orm';
import type { RosterResponse } from '@/shared/schema/api';
import type { DeviceTx } from './deviceDb';
import { setFact } from './meta';
import { roster } from './schema/deviceTables';

const longestWaitSeconds = 300;

export type RosterRow = typeof roster.$inferSelect;

/** Replaces what the device knows of the shop and its people. Wrong tries survive, unless the PIN is a new one;
 * people who are gone stay by name, because readings name them. */
export async function storeRoster(tx: DeviceTx, answer: RosterResponse): Promise<void> {
  await setFact(tx, 'shop', answer.shop);
  const ids = answer.people.map((person) => person.id);
  await tx
    .update(roster)
    .set({ isRemoved: true, pinHash: null })
    .where(notInArray(roster.personId, sql`(select value from json_each(${JSON.stringify(ids)}))`));
  for (const person of answer.people) {
    const known = { name: person.name, roles: person.roles, pinHash: person.pinHash, isRemoved: false };
    const isSamePin = sql`${roster.pinHash} is excluded.pin_hash`;
    await tx
      .insert(roster)
      .values({ personId: person.id, ...known })
      .onConflictDoUpdate({
        target: roster.personId,
        set: {
          ...known,
          wrongTryCount: sql`case when ${isSamePin} then ${roster.wrongTryCount} else 0 end`,
          waitUntilAt: sql`case when ${isSamePin} then ${roster.waitUntilAt} else null end`,
        },
      });
  }
}

/** The people who may sign in on this device, by name. */
export function peopleHere(tx: DeviceTx): Promise<RosterRow[]> {
  return tx.select().from(roster).where(eq(roster.isRemoved, false)).orderBy(asc(roster.name));
}

/** One person of the shop who is not gone. */
export async function personHere(tx: DeviceTx, personId: string): Promise<RosterRow | undefined> {
  const [row] = await tx
    .select()
    .from(roster)
    .where(and(eq(roster.personId, personId), eq(roster.isRemoved, false)));
  return row;
}

/** Seconds to wait after so many wrong tries in a row: nothing for two, then 5, 10, 20 … up to five minutes. */
export function waitSecondsAfter(wrongTryCount: number): number {
  return wrongTryCount < 3 ? 0 : Math.min(longestWaitSeconds, 5 * 2 ** (wrongTryCount - 3));
}

/** Counts a try as wrong before its PIN is looked at, so that ending the app in between does not hide it.
 * @returns the seconds to wait still, when it is too early to try; otherwise what the PIN is to be compared with (null
 *   for somebody unknown or without a PIN) and the wait that follows should it be wrong
 */
export async function countTry(
  tx: DeviceTx,
  personId: string,
  nowMs: number,
): Promise<{ waitSeconds: number } | { pinHash: string | null; waitSecondsIfWrong: number }> {
  const person = await personHere(tx, personId);
  if (!person) return { pinHash: null, waitSecondsIfWrong: 0 };
  const leftMs = person.waitUntilAt === null ? 0 : Date.parse(person.waitUntilAt) - nowMs;
  // a clock that was set back must not lock somebody out for longer than the longest wait
  if (leftMs > 0) return { waitSeconds: Math.min(longestWaitSeconds, Math.ceil(leftMs / 1000)) };
  const wrongTryCount = person.wrongTryCount + 1;
  const waitSecondsIfWrong = waitSecondsAfter(wrongTryCount);
  const waitUntilAt =
    waitSecondsIfWrong === 0 ? null : new Date(nowMs + waitSecondsIfWrong * 1000).toISOString();
  await tx.update(roster).set({ wrongTryCount, waitUntilAt }).where(eq(roster.personId, personId));
  return { pinHash: person.pinHash, waitSecondsIfWrong };
}

/** A right PIN: what was wrong before is forgotten. */
export async function forgetTries(tx: DeviceTx, personId: string): Promise<void> {
  await tx.update(roster).set({ wrongTryCount: 0, waitUntilAt: null }).where(eq(roster.personId, personId));
}
