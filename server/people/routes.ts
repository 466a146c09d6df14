import type { Router } from 'express';
import type { Deps } from '../deps';
import { asPerson } from '../http/handlers';
import { idInPath } from '../http/parse';
import { readBody } from '../http/readBody';
import { listPeople } from './listPeople';
import { setPin } from './setPin';

/** The people of the shop. */
export function peopleRoutes(api: Router, deps: Deps): void {
  api.get(
    '/people',
    asPerson(deps, (ctx) => listPeople(ctx)),
  );
  api.put(
    '/people/:id/pin',
    asPerson(deps, async (ctx, request, response) =>
      setPin(ctx, idInPath(request.params.id), await readBody(request, response)),
    ),
  );
}
