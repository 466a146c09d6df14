import type { Router } from 'express';
import type { Deps } from '../deps';
import { asPerson } from '../http/handlers';
import { getCatalogue } from './getCatalogue';

/** What a session can be started from. */
export function catalogueRoutes(api: Router, deps: Deps): void {
  api.get(
    '/catalogue',
    asPerson(deps, (ctx) => getCatalogue(ctx)),
  );
}
