import pg from 'pg';
import type { ServerDb } from '@/db/server/connect';
import type { Ctx } from '../ctx';

type Listener = { onPoke: () => void; onEnd: () => void };

/** Tells whoever listens that something of a shop changed; never what. */
export type Pokes = {
  /** @returns how to stop listening */
  listen: (shopId: string, listener: Listener) => () => void;
  /** ends every stream, when the server goes */
  endStreams: () => void;
  start: () => void;
  stop: () => Promise<void>;
};

const longestPauseMs = 10_000;

/** Pokes by LISTEN: one connection a process, opened anew whenever it breaks. After a break everyone is poked once,
 * because what was said meanwhile was not heard.
 */
export function makePokes(db: ServerDb, log: Ctx['log']): Pokes {
  const listeners = new Map<string, Set<Listener>>();
  let client: pg.Client | null = null;
  let isStopped = false;
  let timer: ReturnType<typeof setTimeout> | undefined;

  const poke = (shopId: string) => listeners.get(shopId)?.forEach(({ onPoke }) => onPoke());
  const connect = async (failures: number): Promise<void> => {
    const next = new pg.Client({ connectionString: db.url, application_name: 'inchwater pokes' });
    let isOver = false;
    const again = (error?: Error) => {
      if (isOver) return;
      isOver = true;
      if (client === next) client = null;
      next.end().catch(() => undefined);
      if (isStopped) return;
      log.warn({ err: error }, 'listening for changes was interrupted');
      timer = setTimeout(() => void connect(failures + 1), Math.min(longestPauseMs, 200 * 2 ** failures));
    };
    next.on('error', again);
    next.on('end', () => again());
    next.on('notification', ({ payload }) => payload && poke(payload));
    try {
      await next.connect();
      await next.query('listen feed');
      if (isStopped) return void next.end();
      client = next;
      failures = 0;
      for (const shopId of listeners.keys()) poke(shopId);
    } catch (error) {
      again(error instanceof Error ? error : undefined);
    }
  };

  return {
    listen: (shopId, listener) => {
      const ofShop = listeners.get(shopId) ?? new Set();
      listeners.set(shopId, ofShop.add(listener));
      return () => {
        ofShop.delete(listener);
        if (ofShop.size === 0 && listeners.get(shopId) === ofShop) listeners.delete(shopId);
      };
    },
    endStreams: () => {
      for (const ofShop of [...listeners.values()]) for (const { onEnd } of [...ofShop]) onEnd();
    },
    start: () => void connect(0),
    stop: async () => {
      isStopped = true;
      clearTimeout(timer);
      await client?.end();
    },
  };
}
