import { z } from 'zod';
import { Fields } from '@/shared/sync/protocol';
import { Id, Instant, KeyedText, Label, Note, PlannedLift, PressureUnit, Role } from './primitives';
import { RosterPerson, ShopSettings } from './records';
import { SessionSummary } from './views';

/* Bodies of the HTTP interface. Requests are strict. */

export const SignInRequest = z.strictObject({
  mail: z.string().trim().toLowerCase().min(3).max(200),
  password: z.string().min(1).max(200),
});
export type SignInRequest = z.infer<typeof SignInRequest>;

export const SignedIn = z.object({
  accessToken: z.string(),
  /** when the access token ends; refresh before */
  expiresAt: Instant,
  person: z.object({ id: Id, name: z.string(), roles: z.array(Role) }),
  shop: z.object({ id: Id, name: z.string(), settings: ShopSettings }),
});
export type SignedIn = z.infer<typeof SignedIn>;

export const SessionList = z.object({ sessions: z.array(SessionSummary) });
export type SessionList = z.infer<typeof SessionList>;

export const PlanSessionRequest = z.strictObject({
  /** made by the page, so that asking twice plans once */
  id: Id,
  stageId: Id,
  benchId: Id,
  standardPressureText: KeyedText,
  standardPressureUnit: PressureUnit,
  liftPlan: z.array(PlannedLift).min(1).max(60),
  note: Note,
});
export type PlanSessionRequest = z.infer<typeof PlanSessionRequest>;

/** A change made at the desk: the same as a device's, without its place in a queue. */
export const DeskChange = z.strictObject({
  id: Id,
  kind: z.enum(['create', 'patch', 'delete']),
  table: z.string().max(40),
  rid: Id,
  base: Fields,
  set: Fields,
});
export type DeskChange = z.infer<typeof DeskChange>;
export const DeskChangesRequest = z.strictObject({ changes: z.array(DeskChange).min(1).max(200) });

export const EnrolmentCode = z.object({ code: z.string(), expiresAt: Instant });
export type EnrolmentCode = z.infer<typeof EnrolmentCode>;

export const DeviceList = z.object({
  devices: z.array(
    z.object({
      id: Id,
      deviceOrdinal: z.number().int(),
      name: z.string(),
      enrolledAt: Instant,
      lastSeenAt: Instant.nullable(),
      pendingCount: z.number().int(),
      revokedAt: Instant.nullable(),
    }),
  ),
});
export type DeviceList = z.infer<typeof DeviceList>;

export const PeopleList = z.object({
  people: z.array(
    z.object({
      id: Id,
      name: z.string(),
      mail: z.string().nullable(),
      roles: z.array(Role),
      hasPin: z.boolean(),
    }),
  ),
});
export type PeopleList = z.infer<typeof PeopleList>;

export const Pin = z.string().regex(/^\d{6}$/, { error: 'six digits' });
export const SetPinRequest = z.strictObject({ pin: Pin });

/** 8 characters without those that are mistaken for one another; a dash or space in the middle is allowed. */
export const EnrolRequest = z.strictObject({
  code: z
    .string()
    .max(20)
    .transform((text) => text.replace(/[\s-]/g, '').toUpperCase())
    .pipe(z.string().regex(/^[A-HJ-NP-Z2-9]{8}$/, { error: 'eight letters and digits' })),
  deviceName: Label,
});
export type EnrolRequest = z.infer<typeof EnrolRequest>;

export const Enrolled = z.object({
  deviceId: Id,
  deviceOrdinal: z.number().int(),
  token: z.string(),
  epoch: z.string(),
});
export type Enrolled = z.infer<typeof Enrolled>;

export const RosterResponse = z.object({
  shop: z.object({ id: Id, name: z.string(), settings: ShopSettings }),
  people: z.array(RosterPerson),
});
export type RosterResponse = z.infer<typeof RosterResponse>;

/** RFC 9457 problem details, with our code. */
export const Problem = z.looseObject({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.string(),
  requestId: z.string().optional(),
  fields: z.array(z.object({ path: z.string(), sentence: z.string() })).optional(),
});
export type Problem = z.infer<typeof Problem>;
