import { eq } from 'drizzle-orm';
import type { Json } from '@/shared/sync/protocol';
import type { DeviceTx } from '@/db/device/deviceDb';
import { drafts } from '@/db/device/schema/deviceTables';
import { benchDevice, stored } from './benchDevice';

/* Half-keyed digits and the place in a run. They never leave the device; the capture screen says what is in them. */

/** What was half-keyed in a run, or null. The screen parses it. */
export async function loadDraft(runId: string): Promise<unknown> {
  const [row] = await benchDevice().db.read.select().from(drafts).where(eq(drafts.runId, runId));
  return row?.draft ?? null;
}

/** Keeps what is half-keyed; null forgets it. The caller decides how often. */
export async function saveDraft(runId: string, draft: Json): Promise<void> {
  const { db, nowMs } = benchDevice();
  const atIso = new Date(nowMs()).toISOString();
  await stored(() => db.tx((tx) => writeDraft(tx, runId, draft, atIso), { isQuiet: true }));
}

/** The same within somebody else's transaction. */
export async function writeDraft(tx: DeviceTx, runId: string, draft: Json, atIso: string): Promise<void> {
  if (draft === null) {
    await tx.delete(drafts).where(eq(drafts.runId, runId));
    return;
  }
  await tx
    .insert(drafts)
    .values({ runId, draft, savedAt: atIso })
    .onConflictDoUpdate({ target: drafts.runId, set: { draft, savedAt: atIso } });
}
