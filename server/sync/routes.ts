import type { Router } from 'express';
import { AppError } from '@/shared/errors';
import type { Deps } from '../deps';
import { findDevice } from '../devices/findDevice';
import { streamPokes } from '../events/stream';
import { asAnyone, asDevice, bearerOf } from '../http/handlers';
import { gateOf } from '../http/limits';
import { readBody } from '../http/readBody';
import { enrol } from './enrol';
import { pull } from './pull';
import { push } from './push';
import { roster } from './roster';

/** The bench devices' side: enrolment, roster, push, pull, pokes. */
export function syncRoutes(api: Router, deps: Deps): void {
  const byPlace = gateOf(deps.limits.enrolByPlace);
  api.post(
    '/sync/enrol',
    asAnyone(deps, async (ctx, request, response) => {
      await byPlace(request, response);
      return enrol(ctx, await readBody(request, response));
    }),
  );
  api.get(
    '/sync/roster',
    asDevice(deps, (ctx) => roster(ctx)),
  );
  api.post(
    '/sync/push',
    asDevice(deps, async (ctx, request, response) => push(ctx, await readBody(request, response, 'push')), {
      evenRevoked: true,
    }),
  );
  api.get(
    '/sync/pull',
    asDevice(deps, (ctx, request) => pull(ctx, request.query)),
  );
  api.get(
    '/sync/events',
    asDevice(deps, (ctx, request, response) =>
      streamPokes(deps, ctx.device.shopId, response, () => isStillKnown(deps, bearerOf(request))),
    ),
  );
}

const isStillKnown = (deps: Deps, token: string) =>
  findDevice(deps, token).then(
    () => true,
    (error: unknown) => {
      if (error instanceof AppError) return false;
      throw error;
    },
  );
