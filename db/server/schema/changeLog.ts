import {
  bigint,
  boolean,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  timestamp,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import type { Fields, Verdict, Why } from '@/shared/sync/protocol';
import { shops } from './shops';

const shopId = () =>
  uuid('shop_id')
    .notNull()
    .references(() => shops.id);

/** Idempotency, audit and history in one: every change ever sent, with its verdict. Append-only by privilege. */
export const changes = pgTable(
  'changes',
  {
    /** no key to shops: row-level security binds it, and a push writes hundreds of these */
    shopId: uuid('shop_id').notNull(),
    id: uuid('id').notNull(),
    /** null for a change made at the desk */
    deviceId: uuid('device_id'),
    n: integer('n'),
    byPersonId: uuid('by_person_id'),
    kind: text('kind').notNull(),
    tableName: text('table_name').notNull(),
    recordId: uuid('record_id'),
    schemaVersion: integer('schema_version').notNull(),
    /** the change as it was sent, whole */
    body: jsonb('body').$type<unknown>().notNull(),
    verdict: text('verdict').$type<Verdict>().notNull(),
    why: text('why').$type<Why>(),
    detail: text('detail'),
    /** version and feed position of the record after an applied change; null when nothing moved */
    version: integer('version'),
    seq: bigint('seq', { mode: 'number' }),
    /** values that it replaced */
    old: jsonb('old').$type<Fields>(),
    isCombined: boolean('is_combined').notNull().default(false),
    recordedAt: text('recorded_at').notNull(),
    receivedAt: timestamp('received_at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('changes_shop_seq')
      .on(t.shopId, t.seq)
      .where(sql`${t.seq} is not null`),
    index('changes_record').on(t.shopId, t.recordId),
  ],
);

/** Two people changed the same field without seeing each other's change. Both values stay. */
export const disputes = pgTable(
  'disputes',
  {
    shopId: shopId(),
    id: uuid('id').notNull(),
    changeId: uuid('change_id').notNull(),
    tableName: text('table_name').notNull(),
    recordId: uuid('record_id').notNull(),
    fieldGroup: text('field_group').notNull(),
    base: jsonb('base').$type<Fields>().notNull(),
    theirs: jsonb('theirs').$type<Fields>().notNull(),
    mine: jsonb('mine').$type<Fields>().notNull(),
    openedAt: timestamp('opened_at', { withTimezone: true }).notNull().defaultNow(),
    settledAt: timestamp('settled_at', { withTimezone: true }),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.id] }), index('disputes_record').on(t.shopId, t.recordId)],
);

/** Acts that are no change to a synced record: enrolling, revoking, PINs, sign-outs. Append-only by privilege. */
export const audit = pgTable(
  'audit',
  {
    shopId: shopId(),
    id: uuid('id').notNull(),
    byPersonId: uuid('by_person_id'),
    act: text('act').notNull(),
    about: text('about').notNull(),
    body: jsonb('body').$type<unknown>().notNull(),
    at: timestamp('at', { withTimezone: true }).notNull().defaultNow(),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.id] })],
);
