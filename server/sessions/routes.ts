import type { Router } from 'express';
import type { Deps } from '../deps';
import { asPerson } from '../http/handlers';
import { idInPath } from '../http/parse';
import { readBody } from '../http/readBody';
import { getSession } from './getSession';
import { listSessions } from './listSessions';
import { planSession } from './planSession';

/** Sessions at the desk. */
export function sessionRoutes(api: Router, deps: Deps): void {
  api.get(
    '/sessions',
    asPerson(deps, (ctx) => listSessions(ctx)),
  );
  api.post(
    '/sessions',
    asPerson(deps, async (ctx, request, response) => planSession(ctx, await readBody(request, response))),
  );
  api.get(
    '/sessions/:id',
    asPerson(deps, (ctx, request) => getSession(ctx, idInPath(request.params.id))),
  );
}
