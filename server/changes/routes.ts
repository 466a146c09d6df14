import type { Router } from 'express';
import type { Deps } from '../deps';
import { asPerson } from '../http/handlers';
import { readBody } from '../http/readBody';
import { changeAtDesk } from './changeAtDesk';

/** Changes to records, made at the desk. */
export function changeRoutes(api: Router, deps: Deps): void {
  api.post(
    '/changes',
    asPerson(deps, async (ctx, request, response) => changeAtDesk(ctx, await readBody(request, response))),
  );
}
