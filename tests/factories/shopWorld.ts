import type { Express } from 'express';
import pino from 'pino';
import request from 'supertest';
import { v7 } from 'uuid';
import { connectServerDb } from '@/db/server/connect';
import { signIns } from '@/db/server/schema/people';
import { withShopUnsynced } from '@/db/server/transaction';
import { createApp } from '@/server/app';
import { refreshSeconds, signAccess, signRefresh } from '@/server/auth/tokens';
import type { PersonCtx } from '@/server/ctx';
import { makeDeps, type Deps } from '@/server/deps';
import { makePokes } from '@/server/events/pokes';
import { addPerson } from '@/server/people/addPerson';
import { createShop } from '@/server/shops/createShop';
import type { Role } from '@/shared/schema/primitives';
import type { ShopSettings } from '@/shared/schema/records';
import type { Change, PullResponse, PushResponse } from '@/shared/sync/protocol';
import { schemaVersion } from '@/shared/sync/syncTables';
import { testDb, type TestDb } from './testDb';

export const shopSettings: ShopSettings = {
  standardPressureText: '28',
  standardPressureUnit: 'inH2O',
  flowUnit: 'cfm',
  pressureUnit: 'inH2O',
  liftUnit: 'in',
  decimalMark: '.',
  referenceAir: 'dry20C',
  allowsSelfApproval: false,
};

/** A server in this process on a database of its own, with a clock that tests move. */
export type TestServer = {
  db: TestDb;
  deps: Deps;
  app: Express;
  /** moves the clock */
  pass: (ms: number) => void;
  close: () => Promise<void>;
};

export async function testServer(over: Partial<Deps> = {}): Promise<TestServer> {
  const db = await testDb();
  const log = pino({ level: 'silent' });
  const serverDb = connectServerDb(db.appUrl, () => undefined);
  const pokes = makePokes(serverDb, log);
  pokes.start();
  let aheadMs = 0;
  const many = [{ tries: 10_000, seconds: 60 }];
  const deps = makeDeps({
    db: serverDb,
    log,
    pokes,
    jwtSecret: new TextEncoder().encode('for tests only, thirty-two bytes or more'),
    buildId: 'test',
    clock: () => new Date(Date.now() + aheadMs),
    limits: { signInByMail: many, signInByPlace: many, enrolByPlace: many },
    ...over,
  });
  return {
    db,
    deps,
    app: createApp(deps),
    pass: (ms) => {
      aheadMs += ms;
    },
    close: async () => {
      pokes.endStreams();
      await pokes.stop();
      await serverDb.pool.end();
      await db.close();
    },
  };
}

export type TestPerson = { id: string; mail: string; password: string; token: string; cookie: string };
export type TestShop = { id: string; owner: PersonCtx; people: Record<Role, TestPerson> };

/** A shop with one person for each role, all signed in. `word` stands in every name, so that a leak can be seen. */
export async function testShop(server: TestServer, word: string): Promise<TestShop> {
  const password = `${word} has a long password`;
  const mailOf = (role: Role) => `${role}@${word}.example`;
  const newPerson = (role: Role, roles: Role[]) => ({
    name: `${word} ${role}`,
    mail: mailOf(role),
    password,
    roles,
    // one is enough: each costs a bcrypt hash
    pin: role === 'operator' ? '246810' : null,
  });
  const owner = await createShop(server.deps, {
    name: `${word} shop`,
    settings: shopSettings,
    owner: newPerson('owner', ['owner']),
  });
  const ids: Record<Role, string> = { owner: owner.actor.id, operator: '', technician: '', supervisor: '' };
  for (const role of ['operator', 'technician', 'supervisor'] as const)
    ids[role] = (await addPerson(owner, newPerson(role, [role]))).id;
  const signed = async (role: Role): Promise<TestPerson> => ({
    id: ids[role],
    mail: mailOf(role),
    password,
    ...(await openSignIn(server, owner.actor.shopId, ids[role])),
  });
  return {
    id: owner.actor.shopId,
    owner,
    people: {
      owner: await signed('owner'),
      operator: await signed('operator'),
      technician: await signed('technician'),
      supervisor: await signed('supervisor'),
    },
  };
}

/** A sign-in as the server makes it, without the slow comparison of passwords. */
async function openSignIn(server: TestServer, shopId: string, personId: string) {
  const { deps } = server;
  const [family, tokenId] = [v7(), v7()];
  await withShopUnsynced(deps.db, shopId, (tx) =>
    tx.orm.insert(signIns).values({
      shopId,
      id: family,
      personId,
      currentTokenId: tokenId,
      expiresAt: new Date(deps.clock().getTime() + refreshSeconds * 1000),
    }),
  );
  const claims = { shop: shopId, sub: personId, family };
  return {
    token: await signAccess(deps, claims),
    cookie: `inchwater_refresh=${await signRefresh(deps, { ...claims, jti: tokenId })}`,
  };
}

/** Signs in over the API. */
export async function signIn(server: TestServer, mail: string, password: string) {
  const answer = await request(server.app).post('/api/auth/sign-in').send({ mail, password }).expect(200);
  return { token: String(answer.body.accessToken), cookie: cookieOf(answer) };
}

/** Requests as a person who is signed in. */
export const asPerson = (server: TestServer, person: Pick<TestPerson, 'token'>) => {
  const signed = (call: request.Test) => call.set('Authorization', `Bearer ${person.token}`);
  return {
    get: (path: string) => signed(request(server.app).get(path)),
    post: (path: string) => signed(request(server.app).post(path)),
    put: (path: string) => signed(request(server.app).put(path)),
  };
};

/** The refresh cookie that an answer sets, as a browser would send it back. */
export function cookieOf(answer: request.Response): string {
  const set = answer.get('Set-Cookie')?.[0] ?? '';
  return set.split(';')[0] ?? '';
}

/** A bench device of a shop, which numbers its changes by itself. */
export class TestDevice {
  n = 0;
  constructor(
    private readonly server: TestServer,
    readonly id: string,
    readonly token: string,
    readonly by: string,
  ) {}

  change(over: Partial<Change> & Pick<Change, 'kind' | 'table' | 'rid'>): Change {
    this.n += 1;
    return {
      id: v7(),
      n: this.n,
      sv: schemaVersion,
      by: this.by,
      at: '2026-12-01T10:00:00.000Z',
      base: {},
      set: {},
      ...over,
    };
  }

  /** Sends a batch and gives the raw answer. */
  send(changes: unknown[], over: Record<string, unknown> = {}) {
    return request(this.server.app)
      .post('/api/sync/push')
      .set('Authorization', `Bearer ${this.token}`)
      .send({
        device: this.id,
        sv: schemaVersion,
        now: '2026-12-01T10:00:00.000Z',
        pendingCount: changes.length,
        changes,
        ...over,
      });
  }

  /** Sends a batch that is expected to be answered. */
  async push(...changes: unknown[]): Promise<PushResponse> {
    const answer = await this.send(changes);
    if (answer.status !== 200)
      throw new Error(`push answered ${answer.status} ${JSON.stringify(answer.body)}`);
    return answer.body as PushResponse;
  }

  pullPage(query: Record<string, unknown>) {
    return request(this.server.app)
      .get('/api/sync/pull')
      .set('Authorization', `Bearer ${this.token}`)
      .query({ after: 0, epoch: '', seen: '', sv: schemaVersion, ...query });
  }

  /** Everything of the feed from the beginning, page by page. */
  async pullAll(limit = 500): Promise<PullResponse> {
    let page = (await this.pullPage({ limit }).expect(200)).body as PullResponse;
    const items = [...page.items];
    while (page.more) {
      const { cursor, epoch, seen } = page;
      page = (await this.pullPage({ after: cursor, epoch, seen, limit }).expect(200)).body as PullResponse;
      items.push(...page.items);
    }
    return { ...page, items };
  }
}

/** Enrols a device through the API, with a code of the supervisor. */
export async function testDevice(server: TestServer, shop: TestShop, name = 'tablet'): Promise<TestDevice> {
  const made = await request(server.app)
    .post('/api/devices/enrolment-codes')
    .set('Authorization', `Bearer ${shop.people.supervisor.token}`)
    .expect(200);
  const enrolled = await request(server.app)
    .post('/api/sync/enrol')
    .send({ code: made.body.code, deviceName: name })
    .expect(200);
  return new TestDevice(server, enrolled.body.deviceId, enrolled.body.token, shop.people.operator.id);
}
