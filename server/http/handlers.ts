import type { Request, RequestHandler, Response } from 'express';
import type { Deps } from '../deps';
import type { DeviceCtx, PersonCtx } from '../ctx';
import { findActor } from '../auth/findActor';
import { findDevice } from '../devices/findDevice';

type Run<C> = (ctx: C, request: Request, response: Response) => Promise<unknown>;

/** Sends what a verb gives back; nothing is 204. */
function send(response: Response, result: unknown): void {
  if (response.headersSent) return;
  response.set('Cache-Control', 'no-store');
  if (result === undefined) response.status(204).end();
  else response.json(result);
}

/** A door for anyone. */
export const asAnyone =
  (deps: Deps, run: Run<Deps>): RequestHandler =>
  async (request, response) =>
    send(response, await run(deps, request, response));

/** A door for a person who is signed in. Their roles and their sign-in are looked up afresh each time. */
export const asPerson =
  (deps: Deps, run: Run<Deps & PersonCtx>): RequestHandler =>
  async (request, response) => {
    const actor = await findActor(deps, bearerOf(request));
    send(response, await run({ ...deps, actor }, request, response));
  };

/** A door for a bench device. One that was shut out comes in only where `evenRevoked` says so. */
export const asDevice =
  (deps: Deps, run: Run<Deps & DeviceCtx>, options: { evenRevoked?: boolean } = {}): RequestHandler =>
  async (request, response) => {
    const device = await findDevice(deps, bearerOf(request), options);
    send(response, await run({ ...deps, device }, request, response));
  };

/** The token of an Authorization header, or nothing. */
export function bearerOf(request: Request): string {
  return /^Bearer ([\w.~+/=-]{1,2000})$/i.exec(request.get('authorization') ?? '')?.[1] ?? '';
}
