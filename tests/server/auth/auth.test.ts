import { decodeJwt, SignJWT } from 'jose';
import pg from 'pg';
import request from 'supertest';
import { createShop } from '@/server/shops/createShop';
import {
  asPerson,
  cookieOf,
  shopSettings,
  signIn,
  testServer,
  testShop,
  type TestPerson,
  type TestServer,
  type TestShop,
} from '@/tests/factories/shopWorld';

let server: TestServer;
let shop: TestShop;
let person: TestPerson;
let admin: pg.Client;

beforeAll(async () => {
  server = await testServer();
  shop = await testShop(server, 'dogwood');
  person = shop.people.supervisor;
  admin = new pg.Client({ connectionString: server.db.adminUrl });
  await admin.connect();
});
afterAll(async () => {
  await admin.end();
  await server.close();
});

const problem = (answer: request.Response) => [answer.status, answer.body.code];
const refresh = (cookie: string) =>
  request(server.app).post('/api/auth/refresh').set('Cookie', cookie).send({});
const fresh = () => signIn(server, person.mail, person.password);
const audited = async (act: string) =>
  (await admin.query('select count(*)::int as n from audit where shop_id = $1 and act = $2', [shop.id, act]))
    .rows[0].n as number;

describe('signing in', () => {
  test('gives who it is, a token for ten minutes, and a cookie that no script and no other site gets', async () => {
    const answer = await request(server.app)
      .post('/api/auth/sign-in')
      .send({ mail: ` ${person.mail.toUpperCase()} `, password: person.password })
      .expect(200);
    expect(answer.body).toMatchObject({
      person: { id: person.id, name: 'dogwood supervisor', roles: ['supervisor'] },
      shop: { id: shop.id, name: 'dogwood shop', settings: shopSettings },
    });
    const { exp = 0, iat = 0 } = decodeJwt(answer.body.accessToken);
    expect(exp - iat).toBe(600);
    expect(answer.get('Set-Cookie')?.[0]).toMatch(/; Path=\/api\/auth; .*HttpOnly; SameSite=Strict/);
    expect(JSON.stringify(answer.body)).not.toContain(cookieOf(answer).split('=')[1]);
    const me = await asPerson(server, { token: answer.body.accessToken }).get('/api/me').expect(200);
    expect(me.body).toEqual({ person: answer.body.person, shop: answer.body.shop });
  });

  test('a wrong password, an unknown mail and a person without a password get the very same answer', async () => {
    const bodies = [];
    for (const [mail, password] of [
      [person.mail, 'wrong'],
      ['nobody@dogwood.example', person.password],
      ['', person.password],
    ]) {
      const answer = await request(server.app).post('/api/auth/sign-in').send({ mail, password });
      if (mail === '') expect(problem(answer)).toEqual([422, 'invalid']);
      else {
        expect(problem(answer)).toEqual([401, 'wrong_sign_in']);
        bodies.push({ ...answer.body, requestId: '' });
      }
    }
    expect(bodies[0]).toEqual(bodies[1]);
  });

  test('one mail address in two shops: the password says which', async () => {
    const other = await createShop(server.deps, {
      name: 'other',
      settings: shopSettings,
      owner: { name: 'x', mail: person.mail, password: 'another long password', roles: ['owner'], pin: null },
    });
    const answer = await request(server.app)
      .post('/api/auth/sign-in')
      .send({ mail: person.mail, password: 'another long password' })
      .expect(200);
    expect(answer.body.shop.id).toBe(other.actor.shopId);
    expect((await asPerson(server, await fresh()).get('/api/me')).body.shop.id).toBe(shop.id);
  });

  test('an account that was closed is out at once, with its open sign-ins', async () => {
    const open = await fresh();
    await admin.query('update people set closed_at = now() where id = $1', [person.id]);
    expect(problem(await asPerson(server, open).get('/api/me'))).toEqual([401, 'sign_in_ended']);
    expect(problem(await refresh(open.cookie))).toEqual([401, 'sign_in_ended']);
    const { mail, password } = person;
    const answer = await request(server.app).post('/api/auth/sign-in').send({ mail, password });
    expect(problem(answer)).toEqual([401, 'wrong_sign_in']);
    await admin.query('update people set closed_at = null where id = $1', [person.id]);
  });

  test('roles are looked up at each request', async () => {
    const open = await fresh();
    const setRoles = (roles: string) =>
      admin.query('update memberships set roles = $1 where person_id = $2', [roles, person.id]);
    await setRoles('["operator"]');
    expect(problem(await asPerson(server, open).post('/api/devices/enrolment-codes'))).toEqual([
      403,
      'not_allowed',
    ]);
    await setRoles('["supervisor"]');
    await asPerson(server, open).post('/api/devices/enrolment-codes').expect(200);
  });
});

describe('access tokens', () => {
  const sign = (
    claims: Record<string, unknown>,
    { secret = server.deps.jwtSecret, audience = 'desk' } = {},
  ) =>
    new SignJWT(claims)
      .setProtectedHeader({ alg: 'HS256' })
      .setIssuer('inchwater')
      .setAudience(audience)
      .setExpirationTime('5m')
      .sign(secret);

  test('one that is over, forged, unsigned, meant for something else or without claims opens nothing', async () => {
    const { token, cookie } = await fresh();
    const claims = decodeJwt(token);
    const forged = await sign(claims, {
      secret: new TextEncoder().encode('another secret of thirty-two bytes!'),
    });
    const unsigned = `${Buffer.from('{"alg":"none"}').toString('base64url')}.${token.split('.')[1]}.`;
    const refreshToken = decodeURIComponent(cookie.split('=')[1] ?? '');
    const strange = await sign({ ...claims, shop: "' or true" });
    for (const bad of [forged, unsigned, refreshToken, strange, await sign({}), `${token}x`])
      expect(problem(await asPerson(server, { token: bad }).get('/api/me'))).toEqual([401, 'sign_in_needed']);
    await asPerson(server, { token }).get('/api/me').expect(200);
    server.pass(601_000);
    expect(problem(await asPerson(server, { token }).get('/api/me'))).toEqual([401, 'sign_in_needed']);
  });
});

describe('refreshing', () => {
  test('gives a new pair, and the new cookie works', async () => {
    const { cookie } = await fresh();
    const first = await refresh(cookie).expect(200);
    expect(cookieOf(first)).not.toBe(cookie);
    await asPerson(server, { token: first.body.accessToken }).get('/api/me').expect(200);
    await refresh(cookieOf(first)).expect(200);
  });

  test('two tabs at the same moment are no theft: both go on', async () => {
    const { cookie } = await fresh();
    const [one, two] = await Promise.all([refresh(cookie), refresh(cookie)]);
    expect([one.status, two.status]).toEqual([200, 200]);
    await refresh(cookieOf(one)).expect(200);
    await refresh(cookieOf(two)).expect(200);
  });

  test('an old token used again ends the whole sign-in, for the thief and for the owner', async () => {
    const before = await audited('signInReused');
    const { cookie, token } = await fresh();
    const next = await refresh(cookie).expect(200);
    server.pass(11_000);
    expect(problem(await refresh(cookie))).toEqual([401, 'sign_in_ended']);
    expect(problem(await refresh(cookieOf(next)))).toEqual([401, 'sign_in_ended']);
    expect(problem(await asPerson(server, { token }).get('/api/me'))).toEqual([401, 'sign_in_ended']);
    expect(await audited('signInReused')).toBe(before + 1);
  });

  test('a token two steps old ends it even within the moment', async () => {
    const { cookie } = await fresh();
    const second = await refresh(cookie).expect(200);
    const third = await refresh(cookieOf(second)).expect(200);
    expect(problem(await refresh(cookie))).toEqual([401, 'sign_in_ended']);
    expect(problem(await refresh(cookieOf(third)))).toEqual([401, 'sign_in_ended']);
  });

  test('without a cookie, with a strange one, with one that is over: 401', async () => {
    expect(problem(await request(server.app).post('/api/auth/refresh').send({}))).toEqual([
      401,
      'sign_in_needed',
    ]);
    expect(problem(await refresh('inchwater_refresh=abc'))).toEqual([401, 'sign_in_needed']);
    const { cookie } = await fresh();
    server.pass(30 * 24 * 3600_000 + 1000);
    expect(problem(await refresh(cookie))).toEqual([401, 'sign_in_needed']);
  });

  test('another site cannot make a browser refresh, sign in or out', async () => {
    const { cookie } = await fresh();
    for (const address of ['/api/auth/refresh', '/api/auth/sign-in', '/api/auth/sign-out']) {
      const call = () => request(server.app).post(address).set('Cookie', cookie);
      expect(problem(await call().set('Sec-Fetch-Site', 'cross-site').send({}))).toEqual([
        403,
        'not_allowed',
      ]);
      expect(problem(await call().set('Sec-Fetch-Site', 'same-site').send({}))).toEqual([403, 'not_allowed']);
      expect(problem(await call().set('Origin', 'http://evil.example').send({}))).toEqual([
        403,
        'not_allowed',
      ]);
      expect(problem(await call().set('Origin', 'null').send({}))).toEqual([403, 'not_allowed']);
      expect(problem(await call().type('text/plain').send('{}'))).toEqual([415, 'unsupported_type']);
    }
    await refresh(cookie).set('Sec-Fetch-Site', 'same-origin').expect(200);
  });
});

describe('signing out', () => {
  test('ends this sign-in alone and takes the cookie away', async () => {
    const here = await fresh();
    const there = await fresh();
    const out = await request(server.app)
      .post('/api/auth/sign-out')
      .set('Cookie', here.cookie)
      .send({})
      .expect(204);
    expect(out.get('Set-Cookie')?.[0]).toMatch(/^inchwater_refresh=;/);
    expect(problem(await asPerson(server, here).get('/api/me'))).toEqual([401, 'sign_in_ended']);
    expect(problem(await refresh(here.cookie))).toEqual([401, 'sign_in_ended']);
    await asPerson(server, there).get('/api/me').expect(200);
    await request(server.app).post('/api/auth/sign-out').send({}).expect(204);
  });

  test('everywhere ends every sign-in of the person at once, and nobody else', async () => {
    const here = await fresh();
    const there = await fresh();
    const colleague = await signIn(server, shop.people.owner.mail, shop.people.owner.password);
    await asPerson(server, here).post('/api/auth/sign-out-everywhere').send({}).expect(204);
    for (const one of [here, there]) {
      expect(problem(await asPerson(server, one).get('/api/me'))).toEqual([401, 'sign_in_ended']);
      expect(problem(await refresh(one.cookie))).toEqual([401, 'sign_in_ended']);
    }
    await asPerson(server, colleague).get('/api/me').expect(200);
    expect(await audited('signedOutEverywhere')).toBe(1);
  });
});

describe('too many tries', () => {
  let strict: TestServer;
  let guarded: TestShop;
  beforeAll(async () => {
    strict = await testServer({
      limits: {
        signInByMail: [{ tries: 3, seconds: 60 }],
        signInByPlace: [{ tries: 8, seconds: 60 }],
        enrolByPlace: [{ tries: 2, seconds: 60 }],
      },
    });
    guarded = await testShop(strict, 'elder');
  });
  afterAll(() => strict.close());

  test('of one mail address are stopped even with the right password, others go on; then the place is stopped', async () => {
    const { owner, operator } = guarded.people;
    const tryIt = (mail: string, password: string) =>
      request(strict.app).post('/api/auth/sign-in').send({ mail, password });
    for (let tries = 0; tries < 3; tries += 1) expect((await tryIt(owner.mail, 'wrong')).status).toBe(401);
    const stopped = await tryIt(owner.mail, owner.password);
    expect(problem(stopped)).toEqual([429, 'too_many_tries']);
    expect(Number(stopped.get('Retry-After'))).toBeGreaterThan(0);
    expect((await tryIt(operator.mail, operator.password)).status).toBe(200);
    for (const n of [1, 2, 3, 4]) expect((await tryIt(`${n}@elder.example`, 'wrong')).status).toBe(401);
    expect(problem(await tryIt(operator.mail, operator.password))).toEqual([429, 'too_many_tries']);
  });

  test('of enrolment codes are stopped', async () => {
    const tryIt = () =>
      request(strict.app).post('/api/sync/enrol').send({ code: 'ABCDEFGH', deviceName: 'x' });
    for (let tries = 0; tries < 2; tries += 1) expect(problem(await tryIt())).toEqual([422, 'wrong_code']);
    expect(problem(await tryIt())).toEqual([429, 'too_many_tries']);
  });
});
