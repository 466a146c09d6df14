import type { Router } from 'express';
import type { Deps } from '../deps';
import { asPerson } from '../http/handlers';
import { idInPath } from '../http/parse';
import { listDevices } from './listDevices';
import { makeEnrolmentCode } from './makeEnrolmentCode';
import { revokeDevice } from './revokeDevice';

/** Bench devices, seen from the desk. */
export function deviceRoutes(api: Router, deps: Deps): void {
  api.get(
    '/devices',
    asPerson(deps, (ctx) => listDevices(ctx)),
  );
  api.post(
    '/devices/enrolment-codes',
    asPerson(deps, (ctx) => makeEnrolmentCode(ctx)),
  );
  api.post(
    '/devices/:id/revoke',
    asPerson(deps, (ctx, request) => revokeDevice(ctx, idInPath(request.params.id))),
  );
}
