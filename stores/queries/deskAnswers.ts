import { z } from 'zod';
import { Id } from '@/shared/schema/primitives';
import { VerdictOf } from '@/shared/sync/protocol';

/** Answer to changes made at the desk: one verdict each. */
export const DeskChangesAnswer = z.object({ verdicts: z.array(VerdictOf) });
export type DeskChangesAnswer = z.infer<typeof DeskChangesAnswer>;

/** Answer to planning a session: what it is called now. */
export const PlannedSession = z.object({ id: Id, label: z.string() });
export type PlannedSession = z.infer<typeof PlannedSession>;
