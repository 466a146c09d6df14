import { z } from 'zod';
import { Id, Instant } from '@/shared/schema/primitives';

/* The messages between a device and the server. Envelopes are strict; each change is parsed on its own, so that one
 * bad change gets its own verdict; items of the feed are loose, so that fields a later server adds are kept. */

export type Json = string | number | boolean | null | Json[] | { [key: string]: Json };
/** Any value of JSON. Not walked: it comes out of a JSON parser, and the schema of its record looks at it next. */
export const Json = z.custom<Json>((value) => value !== undefined);
export const Fields = z.record(z.string().max(60), Json);
export type Fields = z.infer<typeof Fields>;

/** One reading as the person saw it when handing in. */
export const SeenReading = z.strictObject({
  readingId: Id,
  liftText: z.string(),
  flowText: z.string(),
  pressureText: z.string(),
});
export type SeenReading = z.infer<typeof SeenReading>;

export const ChangeKind = z.enum(['create', 'patch', 'delete', 'handIn']);
export type ChangeKind = z.infer<typeof ChangeKind>;

/** A small change, with the values its author saw. */
export const Change = z.strictObject({
  id: Id,
  /** 1, 2, 3… per device: where in the order */
  n: z.number().int().min(1),
  kind: ChangeKind,
  table: z.string().max(40),
  rid: Id,
  /** schema version when it was recorded */
  sv: z.number().int().min(1),
  /** person */
  by: Id,
  /** device clock: kept and shown, never used to order */
  at: Instant,
  /** values the author saw, for the fields in `set` (patch), or nothing */
  base: Fields,
  set: Fields,
  /** hand in: the readings as seen */
  expect: z.array(SeenReading).max(5000).optional(),
});
export type Change = z.infer<typeof Change>;

export const Verdict = z.enum(['applied', 'dispute', 'held', 'rejected']);
export type Verdict = z.infer<typeof Verdict>;

/** Why a change was not simply applied: closed list, each with a sentence in `whySentence`. */
export const Why = z.enum([
  'invalid',
  'unknown_table',
  'unknown_parent',
  'unknown_record',
  'parent_rejected',
  'parent_held',
  'not_by_device',
  'newer_version',
  'exists_differently',
  'fixed_field',
  'changed_since_seen',
  'deleted_meanwhile',
  'differs',
  'session_closed',
  'account_closed',
  'device_revoked',
  'unknown_person',
]);
export type Why = z.infer<typeof Why>;

export const VerdictOf = z.strictObject({
  id: Id,
  verdict: Verdict,
  why: Why.optional(),
  /** which field was refused, in words, when `why` is `invalid` */
  detail: z.string().optional(),
  /** version of the record after the change */
  version: z.number().int().optional(),
});
export type VerdictOf = z.infer<typeof VerdictOf>;

export const maxBatch = 500;
export const maxBatchBytes = 256 * 1024;

/** Push envelope; `changes` stay unparsed here on purpose. */
export const PushRequest = z.strictObject({
  device: Id,
  sv: z.number().int().min(1),
  now: Instant,
  /** how many wait on the device, this batch included: shown at the desk */
  pendingCount: z.number().int().min(0),
  changes: z.array(z.unknown()).min(1).max(maxBatch),
});
export type PushRequest = z.infer<typeof PushRequest>;

export const PushResponse = z.strictObject({
  epoch: z.string(),
  /** highest n the server holds for this device */
  last: z.number().int().min(0),
  now: Instant,
  verdicts: z.array(VerdictOf),
});
export type PushResponse = z.infer<typeof PushResponse>;

/** One record as the feed carries it. */
export const FeedItem = z.looseObject({
  table: z.string(),
  id: Id,
  version: z.number().int(),
  deleted: z.boolean(),
  seq: z.number().int(),
  fields: Fields,
});
export type FeedItem = z.infer<typeof FeedItem>;

export const PullQuery = z.strictObject({
  after: z.coerce.number().int().min(0),
  epoch: z.string().max(80),
  /** id of the last change the device saw in the feed; empty at the first pull */
  seen: z.union([Id, z.literal('')]),
  limit: z.coerce.number().int().min(1).max(500).default(500),
  sv: z.coerce.number().int().min(1),
});
export type PullQuery = z.infer<typeof PullQuery>;

export const PullResponse = z.looseObject({
  epoch: z.string(),
  cursor: z.number().int(),
  /** id of the last change at or below the cursor: sent back as `seen` */
  seen: z.union([Id, z.literal('')]),
  more: z.boolean(),
  now: Instant,
  items: z.array(FeedItem),
});
export type PullResponse = z.infer<typeof PullResponse>;
