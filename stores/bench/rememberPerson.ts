import { z } from 'zod';

/* Who is signed in at the bench lives in the page. A page that was merely reloaded within five minutes (an update, a
 * tab handed over, a slip of the finger) finds the person again in the tab's session storage; a browser that was ended,
 * a new tab or a longer pause asks for the PIN. */

const key = 'inchwater-bench-person';
const graceMs = 5 * 60 * 1000;
const Remembered = z.strictObject({ personId: z.string(), seenAtMs: z.number() });

/** Notes that the person was here now; null forgets. */
export function rememberPerson(personId: string | null, nowMs: number): void {
  const storage = tabStorage();
  if (personId === null) storage?.removeItem(key);
  else
    storage?.setItem(key, JSON.stringify({ personId, seenAtMs: nowMs } satisfies z.infer<typeof Remembered>));
}

/** The person who was here in this tab less than five minutes ago, or null. */
export function rememberedPerson(nowMs: number): string | null {
  try {
    const found = Remembered.parse(JSON.parse(tabStorage()?.getItem(key) ?? 'null'));
    const ageMs = nowMs - found.seenAtMs;
    return ageMs >= 0 && ageMs < graceMs ? found.personId : null;
  } catch {
    return null;
  }
}

/** Session storage, where the browser allows it. */
function tabStorage(): Storage | null {
  try {
    return typeof sessionStorage === 'undefined' ? null : sessionStorage;
  } catch {
    return null;
  }
}
