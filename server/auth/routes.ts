import type { Request, Response, Router } from 'express';
import type { Deps } from '../deps';
import { asAnyone, asPerson } from '../http/handlers';
import { gateOf } from '../http/limits';
import { readBody } from '../http/readBody';
import { refuseOtherSites } from '../http/sameSite';
import { me } from './me';
import { refresh } from './refresh';
import { signIn } from './signIn';
import { signOut, signOutEverywhere } from './signOut';
import { refreshSeconds } from './tokens';

const cookieName = 'inchwater_refresh';
const cookieOf = (request: Request) => ({
  httpOnly: true,
  sameSite: 'strict' as const,
  path: '/api/auth',
  secure: request.secure,
});

const heldToken = (request: Request): string => {
  const cookies = request.cookies as Record<string, unknown>;
  const token = cookies[cookieName];
  return typeof token === 'string' ? token : '';
};

/** Signing in, staying signed in, signing out. */
export function authRoutes(api: Router, deps: Deps): void {
  const byMail = gateOf(deps.limits.signInByMail, (request) => mailOf(request.body));
  const byPlace = gateOf(deps.limits.signInByPlace);
  const give = (request: Request, response: Response, refreshToken: string) =>
    response.cookie(cookieName, refreshToken, { ...cookieOf(request), maxAge: refreshSeconds * 1000 });
  const take = (request: Request, response: Response) => response.clearCookie(cookieName, cookieOf(request));

  api.post(
    '/auth/sign-in',
    asAnyone(deps, async (_, request, response) => {
      refuseOtherSites(request);
      await byPlace(request, response);
      const raw = await readBody(request, response);
      await byMail(request, response);
      const { body, refreshToken } = await signIn(deps, raw);
      give(request, response, refreshToken);
      return body;
    }),
  );
  api.post(
    '/auth/refresh',
    asAnyone(deps, async (_, request, response) => {
      refuseOtherSites(request);
      await readBody(request, response);
      const { body, refreshToken } = await refresh(deps, heldToken(request));
      give(request, response, refreshToken);
      return body;
    }),
  );
  api.post(
    '/auth/sign-out',
    asAnyone(deps, async (_, request, response) => {
      refuseOtherSites(request);
      await readBody(request, response);
      await signOut(deps, heldToken(request));
      take(request, response);
    }),
  );
  api.post(
    '/auth/sign-out-everywhere',
    asPerson(deps, async (ctx, request, response) => {
      await signOutEverywhere(ctx);
      take(request, response);
    }),
  );
  api.get(
    '/me',
    asPerson(deps, (ctx) => me(ctx)),
  );
}

function mailOf(body: unknown): string {
  const mail = typeof body === 'object' && body !== null && 'mail' in body ? body.mail : '';
  return typeof mail === 'string' ? mail.trim().toLowerCase().slice(0, 200) : '';
}
