import { localTime } from '@/components/session/localTime';
import type { StatusFacts } from '@/components/ui/StatusStrip';

/** Where the readings of a device are, in numbers. */
export type DeviceStanding = {
  state: 'idle' | 'sending' | 'waiting' | 'offline' | 'enrolAgain' | 'revoked' | 'updateNeeded';
  /** changes of every kind that wait */
  unsentCount: number;
  /** readings among what they are about */
  unsentReadingCount: number;
  setAsideCount: number;
  heldCount: number;
  disputeCount: number;
  oldestUnsentAt: string | null;
  lastSentAt: string | null;
};

/** Whether a whole name and the place of the readings do not fit beside each other. */
export const isNarrowFor = (widthPx: number): boolean => widthPx < 560;

const hourMs = 60 * 60 * 1000;
const oldFromMs = 24 * hourMs;

/** The three facts of the status strip. On a narrow screen the given name stands for the person: where the readings are
 * must not be cut off. */
export function statusFacts(name: string, sync: DeviceStanding, now: Date, isNarrow: boolean): StatusFacts {
  const who = isNarrow ? (name.split(/\s+/)[0] ?? name) : name;
  const ageMs = sync.oldestUnsentAt === null ? 0 : now.getTime() - Date.parse(sync.oldestUnsentAt);
  const isOld = sync.unsentCount > 0 && ageMs > oldFromMs;
  return { who, where: whereWords(sync, ageMs, isOld, now), isOld, needsPersonCount: needsPerson(sync) };
}

function whereWords(sync: DeviceStanding, ageMs: number, isOld: boolean, now: Date): string {
  if (sync.unsentCount > 0) {
    const days = Math.floor(ageMs / (24 * hourMs));
    // people count readings; that a session and its lifts wait too needs no number
    const count = sync.unsentReadingCount > 0 ? `${sync.unsentReadingCount} ` : '';
    return isOld
      ? `${count}on this device for ${days === 1 ? '1 day' : `${days} days`}`
      : `${count}saved on this device`;
  }
  return sync.lastSentAt === null ? 'nothing to send' : `all sent ${localTime(sync.lastSentAt, now)}`;
}

/** How many things stand until a person does something about them. */
function needsPerson(sync: DeviceStanding): number {
  const isDeviceStuck = ['enrolAgain', 'revoked', 'updateNeeded'].includes(sync.state);
  return sync.setAsideCount + sync.heldCount + sync.disputeCount + (isDeviceStuck ? 1 : 0);
}

/** What the network does for the readings, in one sentence. */
export function sendingSentence(sync: DeviceStanding): string {
  switch (sync.state) {
    case 'sending':
      return 'Sending now.';
    case 'offline':
      return 'No network. Everything is saved on this device and will be sent when the network is back.';
    case 'waiting':
      return 'The server could not take it just now. It is tried again by itself.';
    case 'enrolAgain':
      return 'The shop no longer knows this device. Enrol it again; the readings on it stay.';
    case 'revoked':
      return 'This device was shut out by the shop. What is on it stays; ask the supervisor.';
    case 'updateNeeded':
      return 'This version of the app is too old to send. Take the new version; the readings stay.';
    case 'idle':
      return sync.unsentCount > 0
        ? 'Saved on this device. It is sent by itself.'
        : 'Everything on this device was sent.';
  }
}
