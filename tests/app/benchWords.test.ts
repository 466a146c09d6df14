import { browserWarnings } from '@/components/bench/browserWarnings';
import { sendingSentence, statusFacts, type DeviceStanding } from '@/components/bench/statusFacts';

const now = new Date('2026-12-02T12:00:00.000Z');
const standing: DeviceStanding = {
  state: 'idle',
  unsentCount: 0,
  unsentReadingCount: 0,
  setAsideCount: 0,
  heldCount: 0,
  disputeCount: 0,
  oldestUnsentAt: null,
  lastSentAt: null,
};
const hoursAgo = (hours: number) => new Date(now.getTime() - hours * 3_600_000).toISOString();
const factsOf = (over: Partial<DeviceStanding>) =>
  statusFacts('Ada Fell', { ...standing, ...over }, now, false);

describe('the status strip', () => {
  it('says how many are saved on this device', () => {
    expect(factsOf({ unsentCount: 31, unsentReadingCount: 14, oldestUnsentAt: hoursAgo(1) })).toMatchObject({
      where: '14 saved on this device',
      isOld: false,
    });
  });
  it('tells the age once the oldest has waited over a day', () => {
    expect(factsOf({ unsentCount: 31, unsentReadingCount: 14, oldestUnsentAt: hoursAgo(23.9) }).isOld).toBe(
      false,
    );
    expect(factsOf({ unsentCount: 31, unsentReadingCount: 14, oldestUnsentAt: hoursAgo(50) })).toMatchObject({
      where: '14 on this device for 2 days',
      isOld: true,
    });
  });
  it('gives no number while only a session and its lifts wait', () => {
    expect(factsOf({ unsentCount: 13 }).where).toBe('saved on this device');
  });
  it('says when all was sent', () => {
    expect(factsOf({ lastSentAt: hoursAgo(0) }).where).toMatch(/^all sent \d\d:\d\d$/);
  });
  it('counts what needs a person; being offline does not', () => {
    expect(factsOf({ state: 'offline', unsentCount: 3 }).needsPersonCount).toBe(0);
    expect(factsOf({ setAsideCount: 1, heldCount: 2, disputeCount: 1 }).needsPersonCount).toBe(4);
    expect(factsOf({ state: 'enrolAgain' }).needsPersonCount).toBe(1);
  });
  it('shortens the person, never where the readings are, on a narrow screen', () => {
    expect(statusFacts('Ada Fell', standing, now, true).who).toBe('Ada');
  });
});

it('every state of sending has its sentence', () => {
  const states = ['idle', 'sending', 'waiting', 'offline', 'enrolAgain', 'revoked', 'updateNeeded'] as const;
  const sentences = states.map((state) => sendingSentence({ ...standing, state, unsentCount: 1 }));
  expect(new Set(sentences).size).toBe(states.length);
});

describe('at enrolment a browser is told what it cannot promise', () => {
  const chromium = 'Mozilla/5.0 (X11; Linux x86_64) AppleWebKit/537.36 Chrome/140.0.0.0 Safari/537.36';
  const safari = 'Mozilla/5.0 (iPad; CPU OS 18_0) AppleWebKit/605.1.15 Version/18.0 Safari/604.1';
  const good = { userAgent: chromium, isSecure: true, hasServiceWorker: true };
  it('nothing in a tested one at a safe address', () => {
    expect(browserWarnings(good)).toEqual([]);
  });
  it('that it is untested', () => {
    expect(browserWarnings({ ...good, userAgent: safari })[0]).toMatch(/untested/);
  });
  it('that plain http holds nothing offline', () => {
    expect(browserWarnings({ ...good, isSecure: false })[0]).toMatch(/https/);
  });
});
