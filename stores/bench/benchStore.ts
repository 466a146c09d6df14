import { create } from 'zustand';
import { AppError } from '@/shared/errors';
import { Role } from '@/shared/schema/primitives';
import type { DeviceDb } from '@/db/device/deviceDb';
import type { DeviceIdentity, DeviceShop } from '@/db/device/meta';
import { openDeviceDb } from '@/db/device/openDb';
import { personHere } from '@/db/device/rosterStore';
import { askForTabLock, beforeHandOver, takeTabLock, waitForTabLock } from '@/db/device/tabLock';
import { coalesce } from '@/stores/desk/coalesce';
import { callApi } from '@/stores/http/apiClient';
import { browserEngine } from '@/stores/sync/browserEngine';
import type { SyncEngine, SyncReport } from '@/stores/sync/syncEngine';
import { setBenchDevice } from './benchDevice';
import { enrolDevice } from './enrolDevice';
import { readStatus, type SyncCounts } from './readStatus';
import { rememberedPerson, rememberPerson } from './rememberPerson';
import { tryPin, type UnlockResult } from './unlockPerson';

export type BenchPerson = { id: string; name: string; roles: Role[] };
export type BenchSync = SyncCounts & SyncReport;

type BenchState = {
  /** opening → otherTab (this browser's database is in use) → notEnrolled → ready; or failed */
  phase: 'opening' | 'otherTab' | 'notEnrolled' | 'failed' | 'ready';
  failure?: string;
  shop: DeviceShop | null;
  device: DeviceIdentity | null;
  /** who passed the PIN; null: ask for it */
  person: BenchPerson | null;
  sync: BenchSync;
};

type BenchVerbs = {
  /** Opens the device's database, once; safe to call from every bench route. */
  open: () => Promise<void>;
  /** Asks the tab that has the database to hand it over. */
  takeOver: () => void;
  /** @throws AppError */
  enrol: (code: string, deviceName: string) => Promise<void>;
  /** @throws AppError `not_saved` */
  unlock: (personId: string, pin: string) => Promise<UnlockResult>;
  lock: () => void;
  syncNow: () => Promise<void>;
};

const nothingKnown: BenchSync = {
  state: 'idle',
  unsentCount: 0,
  unsentReadingCount: 0,
  setAsideCount: 0,
  heldCount: 0,
  disputeCount: 0,
  oldestUnsentAt: null,
  lastSentAt: null,
  clockOffsetMs: null,
};

const nowMs = () => Date.now();
let opening: Promise<void> | undefined;
let db: DeviceDb | undefined;
let engine: SyncEngine | undefined;

/** The bench of this browser: its database, who is signed in, and where the readings are. */
export const useBenchStore = create<BenchState & BenchVerbs>()((set, get) => {
  const report = ({ state, progress, lastError }: SyncReport) =>
    set({ sync: { ...get().sync, state, progress, lastError } });

  /** Follows every commit: counts, shop, device, and whether the person is still one of the shop. */
  const follow = coalesce(async () => {
    if (!db) return;
    const { device, shop, counts } = await readStatus(db.read);
    const person = get().person;
    const isGone = person !== null && !(await personHere(db.read, person.id));
    set({ device, shop, sync: { ...get().sync, ...counts }, ...(isGone ? { person: null } : {}) });
    if (person && !isGone) rememberPerson(person.id, nowMs());
  });

  async function start(): Promise<void> {
    db = await openDeviceDb();
    const opened = db;
    engine = browserEngine(opened, report);
    setBenchDevice({
      db: opened,
      nowMs,
      personId: () => get().person?.id ?? null,
      onRecorded: () => engine?.saved(),
    });
    opened.onCommit(follow);
    beforeHandOver(async () => {
      await engine?.stop();
      await opened.idle();
    });
    const { device, shop, counts } = await readStatus(opened.read);
    const person = await personOf(opened, rememberedPerson(nowMs()));
    set({
      device,
      shop,
      person,
      sync: { ...get().sync, ...counts },
      phase: device ? 'ready' : 'notEnrolled',
    });
    if (device) engine.start();
  }

  async function open(): Promise<void> {
    try {
      if (!(await takeTabLock())) {
        set({ phase: 'otherTab' });
        await waitForTabLock();
        set({ phase: 'opening' });
      }
      await start();
    } catch (error) {
      set({ phase: 'failed', failure: error instanceof AppError ? error.message : cannotOpen(error) });
    }
  }

  return {
    phase: 'opening',
    shop: null,
    device: null,
    person: null,
    sync: nothingKnown,
    open: () => (opening ??= open()),
    takeOver: askForTabLock,
    enrol: async (code, deviceName) => {
      if (!db || !engine) throw new AppError('not_saved');
      await engine.stop();
      try {
        await enrolDevice({ db, call: callApi }, code, deviceName);
      } finally {
        if (get().device) engine.start();
      }
      const { device, shop, counts } = await readStatus(db.read);
      set({
        device,
        shop,
        phase: 'ready',
        sync: { ...get().sync, ...counts, state: 'idle', lastError: undefined },
      });
      // the browser may say no; the age of unsent work is shown for that reason
      await globalThis.navigator?.storage?.persist?.().catch(() => false);
      engine.start();
    },
    unlock: async (personId, pin) => {
      const result = await tryPin(personId, pin);
      if ('ok' in result && db) {
        const person = await personOf(db, personId);
        set({ person });
        rememberPerson(person?.id ?? null, nowMs());
      }
      return result;
    },
    lock: () => {
      set({ person: null });
      rememberPerson(null, nowMs());
    },
    syncNow: async () => {
      await engine?.syncNow();
    },
  };
});

async function personOf(opened: DeviceDb, personId: string | null): Promise<BenchPerson | null> {
  const row = personId === null ? undefined : await personHere(opened.read, personId);
  if (!row) return null;
  return {
    id: row.personId,
    name: row.name,
    roles: row.roles.flatMap((role) => Role.safeParse(role).data ?? []),
  };
}

const cannotOpen = (error: unknown): string =>
  `The database of this browser could not be opened. Close other windows of this app and reload; what is on it stays. (${String(error)})`;
