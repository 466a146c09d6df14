import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import zlib from 'node:zlib';
import pino from 'pino';
import request from 'supertest';
import { createApp } from '@/server/app';
import {
  asPerson,
  cookieOf,
  testServer,
  testShop,
  type TestServer,
  type TestShop,
} from '@/tests/factories/shopWorld';

let server: TestServer;
let shop: TestShop;
const dist = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-dist-'));
const script = '_expo/static/js/web/entry-0123456789abcdef0123456789abcdef.js';

beforeAll(async () => {
  const put = (name: string, content: string | Buffer) => {
    fs.mkdirSync(path.dirname(path.join(dist, name)), { recursive: true });
    fs.writeFileSync(path.join(dist, name), content);
  };
  put('index.html', '<!doctype html><title>the app</title>');
  put('sw.js', '// worker');
  put(script, 'plain');
  put(`${script}.br`, zlib.brotliCompressSync('packed'));
  server = await testServer({ dist });
  shop = await testShop(server, 'cedar');
});
afterAll(async () => {
  await server.close();
  fs.rmSync(dist, { recursive: true });
});

const problem = (answer: request.Response) => [answer.status, answer.body.code];

describe('refusals are problem details', () => {
  test('with type, title, status, code and the id of the request, which is in the header too', async () => {
    const answer = await request(server.app).get('/api/nowhere').expect(404);
    expect(answer.type).toBe('application/problem+json');
    expect(answer.body).toEqual({
      type: 'urn:inchwater:problem:not_found',
      title: 'There is nothing at this address.',
      status: 404,
      code: 'not_found',
      requestId: answer.get('X-Request-Id'),
    });
  });

  test('a known address asked the wrong way says which ways there are', async () => {
    const answer = await request(server.app).delete('/api/sessions');
    expect(problem(answer)).toEqual([405, 'method_not_allowed']);
    expect(answer.get('Allow')).toBe('GET, POST');
  });

  test.each<[string, string, string | Buffer, [number, string]]>([
    ['no JSON', 'application/json', '{"changes":', [400, 'bad_json']],
    ['a bare word', 'application/json', '"text"', [400, 'bad_json']],
    ['nothing', 'application/json', '', [422, 'invalid']],
    ['bytes that are no text', 'application/json', Buffer.from([0xff, 0xfe, 0x00]), [400, 'bad_json']],
    ['a form', 'application/x-www-form-urlencoded', 'a=1', [415, 'unsupported_type']],
    ['plain text', 'text/plain', '{}', [415, 'unsupported_type']],
    ['a strange character set', 'application/json; charset=klingon', '{}', [415, 'unsupported_type']],
    ['a list', 'application/json', '[]', [422, 'invalid']],
    ['of the wrong shape', 'application/json', '{"changes":{"a":1}}', [422, 'invalid']],
    ['with a NUL', 'application/json', '{"changes":["\\u0000"]}', [422, 'invalid']],
    ['with half a surrogate', 'application/json', '{"chan\\ud800ges":[]}', [422, 'invalid']],
    [
      'nested without end',
      'application/json',
      '{"changes":'.repeat(3000) + '1' + '}'.repeat(3000),
      [422, 'invalid'],
    ],
    ['too large', 'application/json', `{"a":"${'x'.repeat(70_000)}"}`, [413, 'too_large']],
  ])('a body that is %s', async (_, type, body, expected) => {
    const call = asPerson(server, shop.people.operator).post('/api/changes').set('Content-Type', type);
    const raw = call.serialize((given: unknown) => given as string).send(body as string);
    expect(problem(await raw)).toEqual(expected);
  });

  test('a packed body that unpacks to too much, and one packed in an unknown way', async () => {
    const call = (encoding: string, body: Buffer) =>
      asPerson(server, shop.people.operator)
        .post('/api/changes')
        .set({ 'Content-Type': 'application/json', 'Content-Encoding': encoding })
        .serialize((given: unknown) => given as string)
        .send(body as unknown as string);
    const bomb = zlib.gzipSync(`{"a":"${'x'.repeat(3_000_000)}"}`);
    expect(problem(await call('gzip', bomb))).toEqual([413, 'too_large']);
    expect(problem(await call('rot13', Buffer.from('{}')))).toEqual([415, 'unsupported_type']);
    expect(problem(await call('gzip', Buffer.from('not packed')))[0]).toBe(400);
  });

  test.each([
    ['/api/sessions/not-an-id', 404],
    ['/api/sessions/0', 404],
    ["/api/sessions/'%20or%20true", 404],
    ['/api/sessions/%00', 404],
    ['/api/sessions/%zz', 400],
    ['/api/sessions/..%2f..%2fetc', 404],
    ['/api/sessions/018f0000-0000-7000-8000-00000000000Z', 404],
    [`/api/sessions/${'9'.repeat(4000)}`, 404],
  ])('GET %s is refused without a fault of ours', async (address, status) => {
    const answer = await asPerson(server, shop.people.operator).get(address);
    expect(answer.status).toBe(status);
    expect(answer.body.code).toBeDefined();
  });

  test.each([
    'Bearer',
    'Bearer ',
    'Basic YTpi',
    'Bearer \u00e9',
    `Bearer ${'a'.repeat(5000)}`,
    'Bearer a.b.c',
  ])('an Authorization header of %j is 401', async (header) => {
    const answer = await request(server.app).get('/api/sessions').set('Authorization', header);
    expect(problem(answer)).toEqual([401, 'sign_in_needed']);
    expect(answer.get('WWW-Authenticate')).toBe('Bearer');
  });
});

test('health says that the database answers, and which build this is', async () => {
  const { body } = await request(server.app).get('/api/health').expect(200);
  expect(body).toEqual({
    status: 'ok',
    database: 'reachable',
    buildId: 'test',
    uptimeS: expect.any(Number),
  });
});

describe('the app', () => {
  const get = (address: string) => request(server.app).get(address);

  test('every screen address is the app, never kept; what is under /api or has an ending is not', async () => {
    for (const address of ['/', '/bench', '/desk/sessions/018f', '/bench/run/1?a=b']) {
      const answer = await get(address).set('Accept', 'text/html').expect(200);
      expect(answer.text).toContain('the app');
      expect(answer.get('Cache-Control')).toBe('no-cache');
    }
    for (const address of ['/api/no', '/missing.js', '/_expo/missing.css', '/.env', '/../package.json'])
      expect((await get(address).set('Accept', 'text/html')).status).toBe(404);
    expect((await request(server.app).post('/bench')).status).toBe(404);
  });

  test('names with a hash are kept for ever and sent packed; the worker is asked for each time', async () => {
    const packed = await get(`/${script}`).set('Accept-Encoding', 'br, gzip').expect(200);
    expect(packed.get('Content-Encoding')).toBe('br');
    expect(packed.get('Content-Type')).toContain('javascript');
    expect(packed.get('Cache-Control')).toBe('public, max-age=31536000, immutable');
    const plain = await get(`/${script}`).set('Accept-Encoding', 'identity').expect(200);
    expect(plain.get('Content-Encoding')).toBeUndefined();
    expect((await get('/sw.js').expect(200)).get('Cache-Control')).toBe('no-cache');
  });

  test('"localhost" is sent to the one address, with the same port and the rest of the address', async () => {
    const answer = await get('/desk?a=b').set('Host', 'localhost:3000').expect(307);
    expect(answer.get('Location')).toBe('http://127.0.0.1:3000/desk?a=b');
    expect((await get('/desk').set('Host', 'localhost.example')).status).toBe(200);
  });

  test('scripts come from here alone, workers may start from a blob, nothing is forced to https', async () => {
    const policy = (await get('/')).get('Content-Security-Policy') ?? '';
    expect(policy).toContain("script-src 'self' 'wasm-unsafe-eval'");
    expect(policy).toContain("worker-src 'self' blob:");
    expect(policy).not.toContain('upgrade-insecure-requests');
    expect((await get('/')).get('X-Powered-By')).toBeUndefined();
  });
});

test('what is logged of a request is its way, its outcome and its id: no token, password, PIN or code', async () => {
  const lines: string[] = [];
  const sink = { write: (line: string) => void lines.push(line) };
  const app = createApp({ ...server.deps, log: pino({ level: 'trace' }, sink) });
  const { mail, password, id, token } = shop.people.owner;
  const signedIn = await request(app).post('/api/auth/sign-in').send({ mail, password }).expect(200);
  await request(app)
    .put(`/api/people/${id}/pin`)
    .set('Authorization', `Bearer ${token}`)
    .send({ pin: '918273' });
  await request(app).post('/api/auth/refresh').set('Cookie', cookieOf(signedIn)).send({}).expect(200);
  await request(app).get('/api/sync/pull?after=0&secret=abc').set('Authorization', 'Bearer some-token');
  await request(app).post('/api/sync/enrol').send({ code: 'QRSTUVWX', deviceName: 'x' });
  expect(lines).toHaveLength(5);
  expect(JSON.parse(lines[1] ?? '')).toMatchObject({
    req: { method: 'PUT', path: `/api/people/${id}/pin`, id: expect.any(String) },
    res: { status: 204 },
  });
  const secrets = [
    password,
    mail,
    '918273',
    token,
    'some-token',
    'secret=abc',
    'QRSTUVWX',
    cookieOf(signedIn),
  ];
  for (const secret of [...secrets, signedIn.body.accessToken]) expect(lines.join('')).not.toContain(secret);
});
