import type { Logger } from 'pino';
import type { Role } from '@/shared/schema/primitives';
import type { ServerDb } from '@/db/server/connect';

/** What every verb is given: tests and the demonstration pass their own clock and ids. */
export type Ctx = {
  db: ServerDb;
  clock: () => Date;
  newId: () => string;
  log: Pick<Logger, 'info' | 'warn' | 'error'>;
};

/** The person who is signed in, as the shop knows them at this moment. */
export type Actor = { shopId: string; id: string; name: string; roles: Role[]; signInId: string | null };
export type PersonCtx = Ctx & { actor: Actor };

/** The bench device that asks. */
export type DeviceCtx = Ctx & { device: { shopId: string; id: string } };
