import type { Change } from '@/shared/sync/protocol';

/** A change as it arrived: read, or only readable enough to be refused by name. */
export type Incoming = {
  id: string;
  /** place in the device's order; null for a change made at the desk */
  n: number | null;
  /** null when it is not a change this server can read */
  change: Change | null;
  /** why it could not be read */
  problem?: string;
  /** as it was sent, in a form that PostgreSQL can store */
  body: unknown;
};
