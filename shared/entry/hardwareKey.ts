import type { KeypadKey } from './keypad';

const named: Record<string, KeypadKey> = {
  '.': 'mark',
  ',': 'mark',
  Decimal: 'mark',
  Backspace: 'backspace',
  Escape: 'clear',
  Enter: 'save',
};

/** The pad's key for a key of a keyboard (`KeyboardEvent.key`), or null when the pad has none. Comma and point are both
 * taken; the pad writes the shop's own mark.
 * @example hardwareKey(',') // 'mark'
 */
export function hardwareKey(key: string): KeypadKey | null {
  return /^\d$/.test(key) ? (key as KeypadKey) : (named[key] ?? null);
}
