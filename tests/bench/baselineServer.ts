import express from 'express';
import type { Pool } from 'pg';
import { z } from 'zod';

/* What a push is measured against: bare Express + zod + one INSERT of a whole batch. No history, no verdicts, no feed,
 * no shop. This file does not change with the product, so that ratios of different days can be compared. */

const Row = z.strictObject({
  id: z.uuid(),
  runId: z.uuid(),
  ordinal: z.number().int(),
  liftText: z.string(),
  flowText: z.string(),
  pressureText: z.string(),
  at: z.string(),
});
const Body = z.strictObject({ rows: z.array(Row).max(500) });

/** Creates the baseline's table and returns its app. */
export async function baselineServer(pool: Pool): Promise<express.Express> {
  await pool.query(
    `create table if not exists baseline (id uuid primary key, "runId" uuid not null, ordinal int not null,
     "liftText" text not null, "flowText" text not null, "pressureText" text not null, at text not null)`,
  );
  const app = express();
  app.use(express.json({ limit: '1mb' }));
  app.post('/baseline', async (request, response) => {
    const { rows } = Body.parse(request.body);
    await pool.query(
      `insert into baseline select * from jsonb_to_recordset($1::jsonb) as r(id uuid, "runId" uuid, ordinal int,
       "liftText" text, "flowText" text, "pressureText" text, at text)`,
      [JSON.stringify(rows)],
    );
    response.json({ taken: rows.length });
  });
  return app;
}
