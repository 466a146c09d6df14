import { may, type Act } from '@/shared/access';
import { AppError } from '@/shared/errors';
import type { SessionState } from '@/shared/schema/records';
import type { PersonCtx } from './ctx';

/** Lets only those go on who may. @throws AppError `not_allowed`: the role is missing; `state_forbids`: it is the state */
export function need(ctx: PersonCtx, act: Act, state: SessionState | null = null): void {
  if (!may(ctx.actor.roles, act)) throw new AppError('not_allowed');
  if (!may(ctx.actor.roles, act, state)) throw new AppError('state_forbids');
}
