import { withShop } from '@/db/server/transaction';
import type { PersonCtx } from '../ctx';
import { readMe } from './signedIn';

/** Who is signed in, and in which shop. */
export const me = (ctx: PersonCtx) => withShop(ctx.db, ctx.actor.shopId, (tx) => readMe(tx, ctx.actor));
