import { asc, eq, isNull } from 'drizzle-orm';
import type { PeopleList } from '@/shared/schema/api';
import { memberships, people, pins } from '@/db/server/schema/people';
import { withShop } from '@/db/server/transaction';
import type { PersonCtx } from '../ctx';

/** The people of the shop whose accounts are open. */
export async function listPeople(ctx: PersonCtx): Promise<PeopleList> {
  return withShop(ctx.db, ctx.actor.shopId, async (tx) => {
    const rows = await tx.orm
      .select({
        id: people.id,
        name: people.name,
        mail: people.mail,
        roles: memberships.roles,
        pinSetAt: pins.setAt,
      })
      .from(people)
      .innerJoin(memberships, eq(memberships.personId, people.id))
      .leftJoin(pins, eq(pins.personId, people.id))
      .where(isNull(people.closedAt))
      .orderBy(asc(people.name), asc(people.id));
    return { people: rows.map(({ pinSetAt, ...person }) => ({ ...person, hasPin: pinSetAt !== null })) };
  });
}
