import type { Router } from 'express';
import { AppError } from '@/shared/errors';
import { findActor } from '../auth/findActor';
import type { Deps } from '../deps';
import { asPerson, bearerOf } from '../http/handlers';
import { streamPokes } from './stream';

/** Pokes for the desk. */
export function eventRoutes(api: Router, deps: Deps): void {
  api.get(
    '/events',
    asPerson(deps, (ctx, request, response) =>
      streamPokes(deps, ctx.actor.shopId, response, () => isStillSignedIn(deps, bearerOf(request))),
    ),
  );
}

const isStillSignedIn = (deps: Deps, token: string) =>
  findActor(deps, token).then(
    () => true,
    (error: unknown) => {
      if (error instanceof AppError) return false;
      throw error;
    },
  );
