import { randomUUID } from 'node:crypto';
import compression from 'compression';
import cookieParser from 'cookie-parser';
import express, { type Express } from 'express';
import helmet from 'helmet';
import { pinoHttp } from 'pino-http';
import { AppError } from '@/shared/errors';
import { apiRouter } from './api';
import type { Deps } from './deps';
import { problemHandler } from './http/problem';
import { oneAddress, serveStaticApp } from './http/staticApp';

/** The whole of the server as an Express app, without a port: tests call it directly. */
export function createApp(deps: Deps): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use(
    pinoHttp({
      logger: deps.log,
      genReqId: (_request, response) => {
        const id = randomUUID();
        response.setHeader('X-Request-Id', id);
        return id;
      },
      // addresses and statuses only: headers and bodies carry tokens, PINs and passwords
      serializers: {
        req: (request: { id: string; method: string; url: string }) => ({
          id: request.id,
          method: request.method,
          path: request.url.split('?')[0],
        }),
        res: (response: { statusCode: number }) => ({ status: response.statusCode }),
      },
      autoLogging: {
        ignore: (request) => !(request.url ?? '').startsWith('/api/') || request.url === '/api/health',
      },
    }),
  );
  app.use(oneAddress);
  app.use(helmet(security));
  app.use(
    compression({
      // a stream of events must not wait in a buffer
      filter: (request, response) =>
        !String(response.getHeader('Content-Type')).startsWith('text/event-stream') &&
        compression.filter(request, response),
    }),
  );
  app.use(cookieParser());
  app.use('/api', apiRouter(deps));
  if (deps.dist !== null) serveStaticApp(app, deps.dist);
  app.use(() => {
    throw new AppError('not_found');
  });
  app.use(problemHandler);
  return app;
}

/** wasm needs 'wasm-unsafe-eval', the database's worker starts from a blob, React Native for Web writes style elements.
 * No upgrade to https: the address is http on the loopback.
 */
const security: Parameters<typeof helmet>[0] = {
  contentSecurityPolicy: {
    useDefaults: false,
    directives: {
      defaultSrc: ["'self'"],
      scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
      workerSrc: ["'self'", 'blob:'],
      styleSrc: ["'self'", "'unsafe-inline'"],
      imgSrc: ["'self'", 'data:', 'blob:'],
      fontSrc: ["'self'", 'data:'],
      connectSrc: ["'self'"],
      manifestSrc: ["'self'"],
      objectSrc: ["'none'"],
      baseUri: ["'none'"],
      formAction: ["'self'"],
      frameAncestors: ["'none'"],
    },
  },
  strictTransportSecurity: false,
  referrerPolicy: { policy: 'same-origin' },
};
