import { integer, text } from 'drizzle-orm/sqlite-core';

/** Columns of every working table on the device. */
export const workingColumns = () => ({
  id: text('id').primaryKey(),
  version: integer('version').notNull(),
  deleted: integer('deleted', { mode: 'boolean' }).notNull(),
  /** where the newest of its changes stands, for the marks on the column and in tables */
  mark: text('mark').$type<'onDevice' | 'sent' | 'dispute' | 'held' | 'setAside'>().notNull(),
});
