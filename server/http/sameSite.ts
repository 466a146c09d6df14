import type { Request } from 'express';
import { AppError } from '@/shared/errors';

/** Refuses requests that another site makes a browser send. The cookie is SameSite=Strict and the body must be JSON,
 * which another site cannot send without being asked first; this is the third lock, and it reads what the browser says
 * about the sender, which no page can forge. @throws AppError `not_allowed`
 */
export function refuseOtherSites(request: Request): void {
  const site = request.get('sec-fetch-site');
  if (site !== undefined) {
    if (site !== 'same-origin' && site !== 'none') throw new AppError('not_allowed');
    return;
  }
  const origin = request.get('origin');
  if (origin === undefined) return;
  const host = URL.canParse(origin) ? new URL(origin).host : null;
  if (host !== request.get('host')) throw new AppError('not_allowed');
}
