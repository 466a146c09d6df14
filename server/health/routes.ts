import type { Router } from 'express';
import { lookUp } from '@/db/server/transaction';
import type { Deps } from '../deps';
import { asAnyone } from '../http/handlers';

/** Whether the program works: the database answers. @throws AppError `busy` when it does not */
export function healthRoutes(api: Router, deps: Deps): void {
  const startedAt = deps.clock().getTime();
  api.get(
    '/health',
    asAnyone(deps, async () => {
      await lookUp(deps.db, 'select 1 as answer', []);
      return {
        status: 'ok',
        database: 'reachable',
        buildId: deps.buildId,
        uptimeS: Math.round((deps.clock().getTime() - startedAt) / 1000),
      };
    }),
  );
}
