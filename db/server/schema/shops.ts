import { bigint, jsonb, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import type { ShopSettings } from '@/shared/schema/records';

export const shops = pgTable('shops', {
  id: uuid('id').primaryKey(),
  name: text('name').notNull(),
  settings: jsonb('settings').$type<ShopSettings>().notNull(),
  createdAt: timestamp('created_at', { withTimezone: true }).notNull().defaultNow(),
});

/** The shop's feed counter, in a row of its own: it changes with every write. */
export const feeds = pgTable('feeds', {
  shopId: uuid('shop_id')
    .primaryKey()
    .references(() => shops.id),
  seq: bigint('seq', { mode: 'number' }).notNull().default(0),
});

/** Raised by the restore command: with the database's oid it is the epoch that devices compare. Not a shop's data. */
export const epochs = pgTable('epochs', {
  bump: bigint('bump', { mode: 'number' }).primaryKey(),
  at: timestamp('at', { withTimezone: true }).notNull().defaultNow(),
});
