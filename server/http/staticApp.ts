import fs from 'node:fs';
import path from 'node:path';
import { type Express, type RequestHandler } from 'express';
import expressStaticGzip from 'express-static-gzip';

/** Metro and Expo write a hash into the names of what never changes. */
const hashedName = /[.-][0-9a-f]{20,}\.\w+(\.(br|gz))?$/;

/** Serves the built web app: hashed names for ever, everything else asked again each time, and index.html for every
 * address of the app itself.
 */
export function serveStaticApp(app: Express, dist: string): void {
  app.use(
    expressStaticGzip(dist, {
      enableBrotli: true,
      orderPreference: ['br', 'gz'],
      serveStatic: {
        setHeaders: (response, file) =>
          response.setHeader(
            'Cache-Control',
            hashedName.test(file) ? 'public, max-age=31536000, immutable' : 'no-cache',
          ),
      },
    }),
  );
  app.use(appAddress(dist));
}

/** An address without a file ending that a browser goes to is a screen. */
function appAddress(dist: string): RequestHandler {
  const index = path.join(dist, 'index.html');
  return (request, response, next) => {
    const isScreen = ['GET', 'HEAD'].includes(request.method) && !/\.[^/]*$/.test(request.path);
    if (!isScreen || !request.accepts('html') || !fs.existsSync(index)) return next();
    response.setHeader('Cache-Control', 'no-cache');
    response.sendFile(index, { dotfiles: 'allow' });
  };
}

/** The app lives at 127.0.0.1: what is stored under "localhost" would be another, empty tablet. */
export const oneAddress: RequestHandler = (request, response, next) => {
  const host = request.get('host') ?? '';
  if (!/^localhost(:\d+)?$/i.test(host)) return next();
  response.redirect(307, `http://127.0.0.1${host.slice('localhost'.length)}${request.originalUrl}`);
};
