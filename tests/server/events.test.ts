import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import pg from 'pg';
import { v7 } from 'uuid';
import { fullShop, type FullShop } from '@/tests/factories/deskShop';
import { customerFields } from '@/tests/factories/shopRecords';
import { asPerson, signIn, testServer, type TestServer } from '@/tests/factories/shopWorld';

let server: TestServer;
let http: Server;
let address: string;
let shop: FullShop;
let other: FullShop;

beforeAll(async () => {
  server = await testServer({ heartbeatMs: 50 });
  http = createServer(server.app);
  await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
  address = `http://127.0.0.1:${(http.address() as AddressInfo).port}`;
  shop = await fullShop(server, 'ivy');
  other = await fullShop(server, 'juniper');
});
afterAll(async () => {
  server.deps.pokes.endStreams();
  await new Promise((resolve) => http.close(resolve));
  await server.close();
});

/** An open stream, read as text. */
class Stream {
  text = '';
  isOver = false;
  private readonly waiting: (() => void)[] = [];
  private readonly stop = new AbortController();

  async open(path: string, token: string): Promise<Response> {
    const response = await fetch(`${address}${path}`, {
      headers: { Authorization: `Bearer ${token}` },
      signal: this.stop.signal,
    });
    if (response.ok) void this.read(response);
    return response;
  }

  private async read(response: Response): Promise<void> {
    const reader = response.body!.getReader();
    const decoder = new TextDecoder();
    try {
      for (let part = await reader.read(); !part.done; part = await reader.read()) {
        this.text += decoder.decode(part.value, { stream: true });
        for (const look of this.waiting.splice(0)) look();
      }
    } catch {
      // closed by the test
    }
    this.isOver = true;
    for (const look of this.waiting.splice(0)) look();
  }

  /** Waits until something holds, looking whenever something came. The test's own time limit is the end of patience. */
  async until(holds: () => boolean): Promise<void> {
    while (!holds()) await new Promise<void>((resolve) => this.waiting.push(resolve));
  }

  count = (what: string) => this.text.split(what).length - 1;
  close = () => this.stop.abort();
}

const write = (where: FullShop) =>
  where.device.push(
    where.device.change({ kind: 'create', table: 'customers', rid: v7(), set: customerFields('x') }),
  );

test('desk and device are poked when their shop changes, and never hear of another shop', async () => {
  const desk = new Stream();
  const device = new Stream();
  const response = await desk.open('/api/events', shop.people.owner.token);
  await device.open('/api/sync/events', shop.device.token);
  expect(response.headers.get('content-type')).toContain('text/event-stream');
  expect(response.headers.get('content-encoding')).toBeNull();
  await write(other);
  await desk.until(() => desk.count(': still here') > 1);
  expect(desk.count('event: poke')).toBe(0);
  await write(shop);
  await desk.until(() => desk.count('event: poke') === 1);
  await device.until(() => device.count('event: poke') === 1);
  expect(desk.text).toMatch(/^(retry: \d+|: still here|event: poke\ndata: \{\}|\n)*$/);
  desk.close();
  device.close();
});

test('a stream ends when its sign-in does, or when its device is shut out', async () => {
  const { mail, password } = shop.people.technician;
  const person = await signIn(server, mail, password);
  const desk = new Stream();
  await desk.open('/api/events', person.token);
  const device = new Stream();
  await device.open('/api/sync/events', other.device.token);
  await asPerson(server, person).post('/api/auth/sign-out-everywhere').send({}).expect(204);
  await asPerson(server, other.people.supervisor).post(`/api/devices/${other.device.id}/revoke`).expect(204);
  await desk.until(() => desk.isOver);
  await device.until(() => device.isOver);
  expect((await new Stream().open('/api/events', person.token)).status).toBe(401);
  expect((await new Stream().open('/api/sync/events', other.device.token)).status).toBe(403);
});

test('when the connection that listens is killed, it listens again and everyone looks once', async () => {
  const desk = new Stream();
  await desk.open('/api/events', shop.people.owner.token);
  const admin = new pg.Client({ connectionString: server.db.adminUrl });
  await admin.connect();
  await admin.query(
    `select pg_terminate_backend(pid) from pg_stat_activity where datname = $1 and application_name = 'inchwater pokes'`,
    [server.db.name],
  );
  await admin.end();
  await desk.until(() => desk.count('event: poke') === 1);
  await write(shop);
  await desk.until(() => desk.count('event: poke') === 2);
  desk.close();
});

test('when the server stops, streams end', async () => {
  const desk = new Stream();
  await desk.open('/api/events', shop.people.owner.token);
  server.deps.pokes.endStreams();
  await desk.until(() => desk.isOver);
});
