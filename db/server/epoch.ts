import type { ShopTx } from './transaction';

/** Which life of the database this is: its oid, and a bump that the restore command raises. */
export const epochSql = `((select oid from pg_database where datname = current_database()) || '.' ||
  (select max(bump) from epochs))`;

/** The epoch, for those who ask for nothing else. */
export async function readEpoch(tx: ShopTx): Promise<string> {
  const { rows } = await tx.client.query<{ epoch: string }>(`select ${epochSql} as epoch`);
  return rows[0]?.epoch ?? '';
}
