import { z } from 'zod';
import { create } from 'zustand';

/** What somebody chose for this device's bench screens. */
export const Preferences = z.strictObject({
  theme: z.enum(['system', 'daylight', 'shed']).catch('daylight'),
  /** the same key again within this time of its release is bounce */
  bounceMs: z.number().int().min(50).max(250).catch(80),
});
export type Preferences = z.infer<typeof Preferences>;

type PreferencesState = Preferences & { choose: (change: Partial<Preferences>) => void };

const place = 'inchwater.bench.preferences';
const usual: Preferences = { theme: 'daylight', bounceMs: 80 };

/** The bench's looks and keys as chosen on this device. */
export const usePreferencesStore = create<PreferencesState>()((set, get) => ({
  ...readPreferences(),
  choose: (change) => {
    set(change);
    const { theme, bounceMs } = get();
    try {
      localStorage.setItem(place, JSON.stringify({ theme, bounceMs } satisfies Preferences));
    } catch {
      // a browser that keeps nothing: the choice holds until the page is closed
    }
  },
}));

function readPreferences(): Preferences {
  try {
    return Preferences.catch(usual).parse(JSON.parse(localStorage.getItem(place) ?? '{}'));
  } catch {
    return usual;
  }
}
