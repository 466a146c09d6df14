import { compare } from 'bcryptjs';

/** Compares a PIN with its verifier, giving way to the screen in between. @returns false also for a broken verifier */
export function comparePin(pin: string, hash: string): Promise<boolean> {
  return compare(pin, hash).catch(() => false);
}
