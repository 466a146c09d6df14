import type { ShopTx } from './transaction';

/** Which life of the database this is: its oid, and a bump that the restore command raises. */
export async function readEpoch(tx: ShopTx): Promise<string> {
  const { rows } = await tx.client.query<{ epoch: string }>(
    `select (select oid from pg_database where datname = current_database()) || '.' || (select max(bump) from epochs)
     as epoch`,
  );
  return rows[0]?.epoch ?? '';
}
