import type { SignedIn } from '@/shared/schema/api';
import { callDesk } from '@/stores/desk/callDesk';
import { useDeskStore } from '@/stores/desk/deskStore';
import { PeopleList } from '@/shared/schema/api';
import { newId } from '../factories/records';

/** A server of this test's own behind `fetch`: answers by path, and writes down what was asked. */
type Answer = { status: number; body: unknown; headers?: Record<string, string> };
let asked: { path: string; token: string | null }[] = [];
let answers: (path: string, token: string | null) => Answer | 'offline';

const personId = newId();
const shopId = newId();
let tokenCount = 0;
function signedIn(over: { personId?: string; lastsMs?: number } = {}): SignedIn {
  tokenCount += 1;
  return {
    accessToken: `token-${tokenCount}`,
    expiresAt: new Date(Date.now() + (over.lastsMs ?? 600_000)).toISOString(),
    person: { id: over.personId ?? personId, name: 'Wren Falk', roles: ['supervisor'] },
    shop: {
      id: shopId,
      name: 'Tarn Heads',
      settings: {
        standardPressureText: '28',
        standardPressureUnit: 'inH2O',
        flowUnit: 'cfm',
        pressureUnit: 'inH2O',
        liftUnit: 'in',
        decimalMark: '.',
        referenceAir: 'dry20C',
        allowsSelfApproval: false,
      },
    },
  };
}
const problem = (status: number, code: string, headers = {}): Answer => ({
  status,
  headers,
  body: { type: 'about:blank', title: code, status, code },
});

beforeEach(() => {
  jest.useFakeTimers({ doNotFake: ['nextTick', 'setImmediate', 'queueMicrotask'] });
  asked = [];
  useDeskStore.setState({ phase: 'starting', signedIn: null, personOrdinal: 0 });
  global.fetch = (async (path: string, init: RequestInit) => {
    const token = new Headers(init.headers).get('authorization')?.replace('Bearer ', '') ?? null;
    asked.push({ path, token });
    const answer = answers(path, token);
    if (answer === 'offline') throw new TypeError('no network');
    return new Response(answer.status === 204 ? null : JSON.stringify(answer.body), {
      status: answer.status,
      headers: answer.headers,
    });
  }) as typeof fetch;
});
afterEach(() => jest.useRealTimers());

const people = { method: 'GET', path: '/api/people', schema: PeopleList } as const;

test('start picks up the sign-in that the cookie still holds', async () => {
  answers = () => ({ status: 200, body: signedIn() });
  await useDeskStore.getState().start();
  expect(useDeskStore.getState().phase).toBe('signedIn');
  expect(useDeskStore.getState().signedIn?.person.name).toBe('Wren Falk');
});

test('start without a sign-in asks for one, and without a server says that there is no answer', async () => {
  answers = () => problem(401, 'sign_in_needed');
  await useDeskStore.getState().start();
  expect(useDeskStore.getState().phase).toBe('signedOut');
  answers = () => 'offline';
  await useDeskStore.getState().start();
  expect(useDeskStore.getState().phase).toBe('unreachable');
});

test('a wrong password stays a refusal with its code, and too many tries carries the wait', async () => {
  answers = () => problem(401, 'wrong_sign_in');
  await expect(useDeskStore.getState().signIn('a@b.example', 'x')).rejects.toMatchObject({
    code: 'wrong_sign_in',
  });
  answers = () => problem(429, 'too_many_tries', { 'retry-after': '30' });
  await expect(useDeskStore.getState().signIn('a@b.example', 'x')).rejects.toMatchObject({
    code: 'too_many_tries',
    extra: { retryAfterSeconds: 30 },
  });
});

test('ten requests with a worn-out token renew it once', async () => {
  answers = () => ({ status: 200, body: signedIn({ lastsMs: 1000 }) });
  await useDeskStore.getState().start();
  jest.setSystemTime(Date.now() + 30_000);
  asked = [];
  answers = (path) =>
    path === '/api/people' ? { status: 200, body: { people: [] } } : { status: 200, body: signedIn() };
  await Promise.all(Array.from({ length: 10 }, () => callDesk(people)));
  expect(asked.filter((call) => call.path === '/api/auth/refresh')).toHaveLength(1);
  expect(asked.filter((call) => call.path === '/api/people')).toHaveLength(10);
});

test('a token that was turned away is renewed and the request repeated with the new one', async () => {
  answers = () => ({ status: 200, body: signedIn() });
  await useDeskStore.getState().start();
  const old = useDeskStore.getState().signedIn?.accessToken;
  answers = (path, token) => {
    if (path === '/api/auth/refresh') return { status: 200, body: signedIn() };
    return token === old ? problem(401, 'sign_in_needed') : { status: 200, body: { people: [] } };
  };
  await expect(callDesk(people)).resolves.toEqual({ people: [] });
});

test('a sign-in that the server ended keeps the person on screen until they sign in again', async () => {
  answers = () => ({ status: 200, body: signedIn() });
  await useDeskStore.getState().start();
  answers = () => problem(401, 'sign_in_ended');
  await expect(callDesk(people)).rejects.toMatchObject({ code: 'sign_in_ended' });
  const { phase, signedIn: kept, personOrdinal } = useDeskStore.getState();
  expect([phase, kept?.person.name]).toEqual(['ended', 'Wren Falk']);

  answers = () => ({ status: 200, body: signedIn() });
  await useDeskStore.getState().signIn('wren@tarn.example', 'right');
  expect(useDeskStore.getState()).toMatchObject({ phase: 'signedIn', personOrdinal });
});

test('another person who signs in gets screens of their own', async () => {
  answers = () => ({ status: 200, body: signedIn() });
  await useDeskStore.getState().start();
  const before = useDeskStore.getState().personOrdinal;
  answers = () => ({ status: 200, body: signedIn({ personId: newId() }) });
  await useDeskStore.getState().signIn('else@tarn.example', 'right');
  expect(useDeskStore.getState().personOrdinal).toBe(before + 1);
});

test('signing out needs the server, and says so when there is none', async () => {
  answers = () => ({ status: 200, body: signedIn() });
  await useDeskStore.getState().start();
  answers = () => 'offline';
  await expect(useDeskStore.getState().signOut('here')).rejects.toMatchObject({ code: 'offline' });
  expect(useDeskStore.getState().phase).toBe('signedIn');
  answers = () => ({ status: 204, body: null });
  await useDeskStore.getState().signOut('everywhere');
  expect(useDeskStore.getState()).toMatchObject({ phase: 'signedOut', signedIn: null });
});
