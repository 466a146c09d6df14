import { eq } from 'drizzle-orm';
import { z } from 'zod';
import { Id, Instant, Label } from '@/shared/schema/primitives';
import { ShopSettings } from '@/shared/schema/records';
import type { DeviceTx } from './deviceDb';
import { meta } from './schema/deviceTables';

/** Facts of which there is one each. Loose where a later version may have written more. */
const facts = {
  device: z.object({ id: Id, deviceOrdinal: z.number().int(), name: Label }),
  token: z.string(),
  shop: z.object({ id: Id, name: z.string(), settings: ShopSettings }),
  /** which life of the server the copies belong to; empty while that is not known */
  epoch: z.string(),
  cursor: z.number().int(),
  /** id of the last change seen in the feed */
  seen: z.string(),
  /** place in the queue of the next change */
  nextN: z.number().int(),
  /** every retained change is being sent again and every record read again, after the server was set back */
  isReplaying: z.boolean(),
  standing: z.enum(['enrolled', 'enrolAgain', 'revoked']),
  /** schema version the working rows were built by */
  sv: z.number().int(),
  /** sessions started on this device so far: the second part of their label */
  sessionCount: z.number().int(),
  lastSentAt: Instant,
  lastPrunedAt: Instant,
  /** how far the server's clock is ahead of the device's, in milliseconds; shown, never used */
  clockOffsetMs: z.number(),
  /** who read the safety card of which session here, newest last: person, a space, session */
  safetyRead: z.array(z.string().max(80)),
} as const;

type Facts = typeof facts;
export type Fact = keyof Facts;
export type FactOf<K extends Fact> = z.infer<Facts[K]>;
export type DeviceIdentity = FactOf<'device'>;
export type DeviceShop = FactOf<'shop'>;

/** Reads one fact. @returns undefined while it was never written, or when it cannot be read */
export async function getFact<K extends Fact>(tx: DeviceTx, key: K): Promise<FactOf<K> | undefined> {
  const [row] = await tx.select({ value: meta.value }).from(meta).where(eq(meta.key, key));
  return row === undefined ? undefined : parseFact(key, row.value);
}

/** Reads every fact at once. */
export async function getFacts(tx: DeviceTx): Promise<{ [K in Fact]?: FactOf<K> }> {
  const rows = await tx.select().from(meta);
  const known = rows.filter((row): row is { key: Fact; value: unknown } => row.key in facts);
  return Object.fromEntries(known.map((row) => [row.key, parseFact(row.key, row.value)]));
}

/** Writes one fact. */
export async function setFact<K extends Fact>(tx: DeviceTx, key: K, value: FactOf<K>): Promise<void> {
  await tx.insert(meta).values({ key, value }).onConflictDoUpdate({ target: meta.key, set: { value } });
}

function parseFact<K extends Fact>(key: K, value: unknown): FactOf<K> | undefined {
  const schema: z.ZodType<FactOf<K>> = facts[key] as unknown as z.ZodType<FactOf<K>>;
  const parsed = schema.safeParse(value);
  return parsed.success ? parsed.data : undefined;
}
