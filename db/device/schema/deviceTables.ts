import { index, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import type { Change, Fields, Verdict, Why } from '@/shared/sync/protocol';

/** One row a fact: device, epoch, cursor, next n, shop. Values are JSON. */
export const meta = sqliteTable('meta', {
  key: text('key').primaryKey(),
  value: text('value', { mode: 'json' }).$type<unknown>().notNull(),
});

/** The server's copy of each record, with fields this version of the app does not know. */
export const copies = sqliteTable(
  'copies',
  {
    tableName: text('table_name').notNull(),
    id: text('id').notNull(),
    version: integer('version').notNull(),
    deleted: integer('deleted', { mode: 'boolean' }).notNull(),
    seq: integer('seq').notNull(),
    fields: text('fields', { mode: 'json' }).$type<Fields>().notNull(),
  },
  (t) => [primaryKey({ columns: [t.tableName, t.id] })],
);

/** The ordered queue. A change stays here after its verdict, 35 days when applied, for ever otherwise. */
export const outbox = sqliteTable(
  'outbox',
  {
    id: text('id').primaryKey(),
    n: integer('n').notNull().unique(),
    tableName: text('table_name').notNull(),
    recordId: text('record_id').notNull(),
    change: text('change', { mode: 'json' }).$type<Change>().notNull(),
    recordedAt: text('recorded_at').notNull(),
    /** null until the server has answered */
    verdict: text('verdict').$type<Verdict>(),
    why: text('why').$type<Why>(),
    detail: text('detail'),
    /** version of the record after it, while the feed has not yet brought that version */
    appliedVersion: integer('applied_version'),
    answeredAt: text('answered_at'),
    tryCount: integer('try_count').notNull().default(0),
    lastTryAt: text('last_try_at'),
    lastAnswer: text('last_answer'),
  },
  (t) => [index('outbox_record').on(t.tableName, t.recordId), index('outbox_verdict').on(t.verdict, t.n)],
);

/** Half-keyed digits and place of a run, so that it opens where it was left. */
export const drafts = sqliteTable('drafts', {
  runId: text('run_id').primaryKey(),
  draft: text('draft', { mode: 'json' }).$type<unknown>().notNull(),
  savedAt: text('saved_at').notNull(),
});

/** The people of the shop as this device knows them, with PIN verifiers and the count of wrong tries. */
export const roster = sqliteTable('roster', {
  personId: text('person_id').primaryKey(),
  name: text('name').notNull(),
  roles: text('roles', { mode: 'json' }).$type<string[]>().notNull(),
  pinHash: text('pin_hash'),
  wrongTryCount: integer('wrong_try_count').notNull().default(0),
  waitUntilAt: text('wait_until_at'),
  isRemoved: integer('is_removed', { mode: 'boolean' }).notNull().default(false),
});
