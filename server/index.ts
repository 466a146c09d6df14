import { createServer } from 'node:http';
import path from 'node:path';
import pino from 'pino';
import { connectServerDb } from '@/db/server/connect';
import { buildId } from '@/shared/build.gen';
import { createApp } from './app';
import { readConfig, type Config } from './config';
import { makeDeps } from './deps';
import { makePokes } from './events/pokes';

const patienceMs = 7_000;

function serve(config: Config): void {
  const log = pino({ level: config.LOG_LEVEL, base: null, timestamp: pino.stdTimeFunctions.isoTime });
  const db = connectServerDb(config.APP_DATABASE_URL, (error) =>
    log.warn({ err: error }, 'lost a connection'),
  );
  const pokes = makePokes(db, log);
  const server = createServer(
    createApp(
      makeDeps({
        db,
        log,
        pokes,
        buildId,
        jwtSecret: new TextEncoder().encode(config.JWT_SECRET),
        dist: path.resolve(config.INCHWATER_DIST),
      }),
    ),
  );

  let isStopping = false;
  const stop = async (signal: string) => {
    if (isStopping) return;
    isStopping = true;
    log.info({ signal }, 'stopping');
    const closed = new Promise<void>((resolve) => server.close(() => resolve()));
    const tooLong = setTimeout(() => server.closeAllConnections(), patienceMs);
    // streams of events end here; requests that are being answered are let finish
    pokes.endStreams();
    server.closeIdleConnections();
    await closed;
    clearTimeout(tooLong);
    await pokes.stop();
    await db.pool.end();
    log.info('stopped');
  };
  for (const signal of ['SIGTERM', 'SIGINT'] as const)
    process.on(signal, () => {
      void stop(signal).finally(() => process.exit(0));
    });

  server.on('error', (error) => {
    log.fatal({ err: error }, 'the server cannot listen');
    process.exit(1);
  });
  server.listen(config.PORT, config.HOST, () => {
    pokes.start();
    log.info({ address: `http://${config.HOST}:${config.PORT}`, buildId }, 'serving');
  });
}

try {
  serve(readConfig(process.env));
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
}
