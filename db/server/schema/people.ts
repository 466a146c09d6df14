import {
  foreignKey,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  timestamp,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import type { Role } from '@/shared/schema/primitives';
import { shops } from './shops';

const shopId = () =>
  uuid('shop_id')
    .notNull()
    .references(() => shops.id);
const instant = (name: string) => timestamp(name, { withTimezone: true });

export const people = pgTable(
  'people',
  {
    shopId: shopId(),
    id: uuid('id').notNull(),
    name: text('name').notNull(),
    /** lower case; null for somebody who only keys at the bench */
    mail: text('mail'),
    passwordHash: text('password_hash'),
    closedAt: instant('closed_at'),
    createdAt: instant('created_at').notNull().defaultNow(),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique().on(t.shopId, t.mail)],
);

export const memberships = pgTable(
  'memberships',
  {
    shopId: shopId(),
    personId: uuid('person_id').notNull(),
    roles: jsonb('roles').$type<Role[]>().notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.personId] }),
    foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
  ],
);

/** PIN verifiers: reach devices by the roster endpoint, never by the feed. */
export const pins = pgTable(
  'pins',
  {
    shopId: shopId(),
    personId: uuid('person_id').notNull(),
    pinHash: text('pin_hash').notNull(),
    setAt: instant('set_at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.personId] }),
    foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
  ],
);

/** One sign-in and the chain of refresh tokens that came from it. Reuse of an old token ends the family. */
export const signIns = pgTable(
  'sign_ins',
  {
    shopId: shopId(),
    id: uuid('id').notNull(),
    personId: uuid('person_id').notNull(),
    /** id of the only refresh token that is good now */
    currentTokenId: uuid('current_token_id').notNull(),
    /** the one before it, and since when: two tabs that refresh at the same moment are no theft */
    previousTokenId: uuid('previous_token_id'),
    rotatedAt: instant('rotated_at').notNull().defaultNow(),
    startedAt: instant('started_at').notNull().defaultNow(),
    lastUsedAt: instant('last_used_at').notNull().defaultNow(),
    expiresAt: instant('expires_at').notNull(),
    endedAt: instant('ended_at'),
    endedWhy: text('ended_why'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
  ],
);

export const devices = pgTable(
  'devices',
  {
    shopId: shopId(),
    id: uuid('id').notNull(),
    /** first part of the session numbers born on it; 0 is the desk */
    deviceOrdinal: integer('device_ordinal').notNull(),
    name: text('name').notNull(),
    /** SHA-256 of the token, hex; unique over all shops because it is looked up before the shop is known */
    tokenHash: text('token_hash').notNull().unique(),
    lastN: integer('last_n').notNull().default(0),
    pendingCount: integer('pending_count').notNull().default(0),
    enrolledBy: uuid('enrolled_by').notNull(),
    enrolledAt: instant('enrolled_at').notNull().defaultNow(),
    lastSeenAt: instant('last_seen_at'),
    revokedAt: instant('revoked_at'),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique().on(t.shopId, t.deviceOrdinal)],
);

/** One-time enrolment codes, good for 15 minutes. */
export const enrolmentCodes = pgTable(
  'enrolment_codes',
  {
    shopId: shopId(),
    id: uuid('id').notNull(),
    codeHash: text('code_hash').notNull().unique(),
    madeBy: uuid('made_by').notNull(),
    madeAt: instant('made_at').notNull().defaultNow(),
    expiresAt: instant('expires_at').notNull(),
    usedAt: instant('used_at'),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.id] })],
);
