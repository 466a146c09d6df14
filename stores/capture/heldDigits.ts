/** What stands half-keyed on the capture screen right now, for the screen that is shown when the app has a fault. */
export type HeldDigits = { lift: string; flowText: string; pressureText: string };

let held: HeldDigits | null = null;

/** Remembers what is in the fields; null when nothing is. */
export function holdDigits(digits: HeldDigits | null): void {
  held = digits;
}

/** What was in the fields last. */
export const heldDigits = (): HeldDigits | null => held;
