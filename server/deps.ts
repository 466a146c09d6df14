import type { Logger } from 'pino';
import { v7 } from 'uuid';
import { oldestSchemaVersion } from './sync/versions';
import { usualLimits, type Limits } from './http/limits';
import type { Pokes } from './events/pokes';
import type { Ctx } from './ctx';

/** Everything the app is made of. Tests replace what they need to. */
export type Deps = Ctx & {
  log: Logger;
  pokes: Pokes;
  /** signs access and refresh tokens */
  jwtSecret: Uint8Array;
  limits: Limits;
  /** folder of the built web app; null serves the API alone */
  dist: string | null;
  buildId: string;
  /** devices older than this may still push, but are asked to update before they pull */
  oldestSchemaVersion: number;
  heartbeatMs: number;
};

type Given = Pick<Deps, 'db' | 'log' | 'pokes' | 'jwtSecret' | 'buildId'>;

/** Dependencies with the usual values for what is not given. */
export function makeDeps(given: Given & Partial<Deps>): Deps {
  const clock = given.clock ?? (() => new Date());
  return {
    newId: () => v7({ msecs: clock().getTime() }),
    limits: usualLimits,
    dist: null,
    oldestSchemaVersion,
    heartbeatMs: 20_000,
    ...given,
    clock,
  };
}
