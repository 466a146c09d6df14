import { Router } from 'express';
import { AppError } from '@/shared/errors';
import { authRoutes } from './auth/routes';
import { catalogueRoutes } from './catalogue/routes';
import { changeRoutes } from './changes/routes';
import type { Deps } from './deps';
import { deviceRoutes } from './devices/routes';
import { eventRoutes } from './events/routes';
import { healthRoutes } from './health/routes';
import { peopleRoutes } from './people/routes';
import { sessionRoutes } from './sessions/routes';
import { syncRoutes } from './sync/routes';

/** Every route of the API, on one router, so that a test can walk them. */
export function apiRouter(deps: Deps): Router {
  const api = Router();
  healthRoutes(api, deps);
  authRoutes(api, deps);
  eventRoutes(api, deps);
  syncRoutes(api, deps);
  sessionRoutes(api, deps);
  catalogueRoutes(api, deps);
  changeRoutes(api, deps);
  deviceRoutes(api, deps);
  peopleRoutes(api, deps);
  refuseOtherMethods(api);
  api.use(() => {
    throw new AppError('not_found');
  });
  return api;
}

/** An address that is there, asked in a way that is not. */
function refuseOtherMethods(api: Router): void {
  const methods = new Map<string, Set<string>>();
  for (const { route } of api.stack) {
    if (!route) continue;
    const known = methods.get(route.path) ?? new Set();
    for (const { method } of route.stack) known.add(method.toUpperCase());
    methods.set(route.path, known);
  }
  for (const [path, known] of methods)
    api.all(path, (_request, response) => {
      response.set('Allow', [...known].join(', '));
      throw new AppError('method_not_allowed');
    });
}
