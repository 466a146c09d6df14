import { bigint, boolean, integer, uuid } from 'drizzle-orm/pg-core';

/** Columns of every synced table; a function, because Drizzle columns belong to one table each. */
export const syncedColumns = () => ({
  shopId: uuid('shop_id').notNull(),
  id: uuid('id').notNull(),
  version: integer('version').notNull(),
  deleted: boolean('deleted').notNull().default(false),
  /** position in the shop's feed, drawn from the shop's counter while its feed lock is held */
  seq: bigint('seq', { mode: 'number' }).notNull(),
});
