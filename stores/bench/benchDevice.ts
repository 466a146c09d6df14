import { AppError } from '@/shared/errors';
import type { DeviceDb, DeviceTx } from '@/db/device/deviceDb';
import type { Author } from '@/db/device/recordChange';

/** What the verbs of the bench stand on: the device's database and who is signed in. */
export type BenchDevice = {
  db: DeviceDb;
  nowMs: () => number;
  /** the person who passed the PIN, or null */
  personId: () => string | null;
  /** something was recorded that waits to be sent */
  onRecorded: () => void;
};

let device: BenchDevice | null = null;
let stopForwarding: () => void = () => undefined;
const listeners = new Set<() => void>();

/** Puts the opened device in place; null takes it away. */
export function setBenchDevice(next: BenchDevice | null): void {
  stopForwarding();
  device = next;
  stopForwarding =
    next?.db.onCommit(() => {
      for (const listener of listeners) listener();
    }) ?? (() => undefined);
}

/** The device, once it is open. @throws AppError `not_saved` before */
export function benchDevice(): BenchDevice {
  if (!device) throw new AppError('not_saved');
  return device;
}

/** Calls back after every local commit, also of a device that is opened later. */
export function onBenchCommit(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** One local transaction by the person signed in. Resolves when it is durable.
 * @throws AppError `sign_in_needed` when nobody is; `not_saved` when the device could not store it
 */
export async function commitAs<T>(work: (tx: DeviceTx, author: Author) => Promise<T>): Promise<T> {
  const { db, nowMs, personId, onRecorded } = benchDevice();
  const person = personId();
  if (person === null) throw new AppError('sign_in_needed');
  const result = await stored(() =>
    db.tx((tx) => work(tx, { personId: person, atIso: new Date(nowMs()).toISOString() })),
  );
  onRecorded();
  return result;
}

/** Runs a local write and gives a failure of the device its sentence. */
export async function stored<T>(write: () => Promise<T>): Promise<T> {
  try {
    return await write();
  } catch (error) {
    if (error instanceof AppError) throw error;
    throw new AppError('not_saved', { extra: { cause: String(error) } });
  }
}
