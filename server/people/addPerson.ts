import { z } from 'zod';
import { AppError } from '@/shared/errors';
import { Pin } from '@/shared/schema/api';
import { Label, Role } from '@/shared/schema/primitives';
import { memberships, people, pins } from '@/db/server/schema/people';
import { withShopUnsynced, type ShopTx } from '@/db/server/transaction';
import { need } from '../access';
import { writeAudit } from '../audit';
import { hashSecret, isTooLong } from '../auth/passwords';
import type { Ctx, PersonCtx } from '../ctx';
import { parse } from '../http/parse';

const Password = z
  .string()
  .min(10, { error: 'at least 10 characters' })
  .refine((text) => !isTooLong(text), { error: 'too long' });

/** A person of the shop. Somebody who only keys at the bench has a PIN and neither mail nor password. */
export const NewPerson = z
  .strictObject({
    name: Label,
    mail: z.email({ error: 'not a mail address' }).toLowerCase().max(200).nullable(),
    password: Password.nullable(),
    roles: z.array(Role).min(1, { error: 'at least one role' }),
    pin: Pin.nullable(),
  })
  .refine((person) => (person.mail === null) === (person.password === null), {
    error: 'mail and password go together',
  });
export type NewPerson = z.infer<typeof NewPerson>;

/** Adds a person to the shop of the one who asks. @throws AppError `not_allowed`, `invalid` */
export async function addPerson(ctx: PersonCtx, raw: unknown): Promise<{ id: string }> {
  need(ctx, 'managePeople');
  const person = await readNewPerson(raw);
  return withShopUnsynced(ctx.db, ctx.actor.shopId, (tx) => insertPerson(ctx, tx, person, ctx.actor.id));
}

type Hashed = Pick<NewPerson, 'name' | 'mail' | 'roles'> & {
  passwordHash: string | null;
  pinHash: string | null;
};

/** Parses a new person and hashes what is secret, before any transaction is open: hashing is slow on purpose. */
export async function readNewPerson(raw: unknown): Promise<Hashed> {
  const { password, pin, ...person } = parse(NewPerson, raw);
  return {
    ...person,
    roles: [...new Set(person.roles)],
    passwordHash: password === null ? null : await hashSecret(password),
    pinHash: pin === null ? null : await hashSecret(pin),
  };
}

/** Writes a person with their roles and PIN, and the line of audit. */
export async function insertPerson(
  ctx: Ctx,
  tx: ShopTx,
  person: Hashed,
  by: string | null,
): Promise<{ id: string }> {
  const { shopId } = tx;
  const id = ctx.newId();
  const added = await tx.orm
    .insert(people)
    .values({
      shopId,
      id,
      name: person.name,
      mail: person.mail,
      passwordHash: person.passwordHash,
      createdAt: ctx.clock(),
    })
    .onConflictDoNothing({ target: [people.shopId, people.mail] })
    .returning({ id: people.id });
  if (added.length === 0)
    throw new AppError('invalid', {
      fields: [{ path: 'mail', sentence: 'somebody of the shop has this address already' }],
    });
  await tx.orm.insert(memberships).values({ shopId, personId: id, roles: person.roles });
  if (person.pinHash !== null)
    await tx.orm.insert(pins).values({ shopId, personId: id, pinHash: person.pinHash, setAt: ctx.clock() });
  await writeAudit(ctx, tx, { by, act: 'personAdded', about: id, body: { roles: person.roles } });
  return { id };
}
