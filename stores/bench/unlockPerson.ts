import { countTry, forgetTries } from '@/db/device/rosterStore';
import { benchDevice, stored } from './benchDevice';
import { comparePin } from './comparePin';

/** Answer to a PIN: it was right, it was wrong, or it was not looked at because of too many tries. */
export type UnlockResult = { ok: true } | { wrong: true } | { waitSeconds: number };

// a verifier of no PIN at all: somebody unknown takes as long as somebody known
const nobodysHash = '$2b$10$8m99dLr6ceAtmxOwM65LHe.hSOSGBxNREqQEgUobbJ8TslJz1tSbK';

/** Tries a PIN, with or without a network. Wrong tries are counted on the device; from the third on each must wait
 * longer. The answer never says which part was wrong. The third and later wrong tries answer with the wait. */
export async function tryPin(personId: string, pin: string): Promise<UnlockResult> {
  const { db, nowMs } = benchDevice();
  const counted = await stored(() => db.tx((tx) => countTry(tx, personId, nowMs()), { isQuiet: true }));
  if ('waitSeconds' in counted) return { waitSeconds: counted.waitSeconds };
  const isRight = await comparePin(pin, counted.pinHash ?? nobodysHash);
  if (isRight && counted.pinHash !== null) {
    await stored(() => db.tx((tx) => forgetTries(tx, personId), { isQuiet: true }));
    return { ok: true };
  }
  return counted.waitSecondsIfWrong > 0 ? { waitSeconds: counted.waitSecondsIfWrong } : { wrong: true };
}
