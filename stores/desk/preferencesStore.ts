import { z } from 'zod';
import { create } from 'zustand';

const Preferences = z.object({
  theme: z.enum(['system', 'daylight', 'shed']).catch('system'),
  /** single letters act; off for those whose speech or hands type them by chance */
  hasKeys: z.boolean().catch(true),
});
type Preferences = z.infer<typeof Preferences>;

type PreferencesState = Preferences & { prefer: (change: Partial<Preferences>) => void };

const place = 'inchwater.desk.preferences';

/** What somebody chose for the desk in this browser. */
export const usePreferencesStore = create<PreferencesState>()((set, get) => ({
  ...readPreferences(),
  prefer: (change) => {
    set(change);
    const { theme, hasKeys } = get();
    try {
      localStorage.setItem(place, JSON.stringify({ theme, hasKeys }));
    } catch {
      // a browser that keeps nothing: the choice holds until the page is closed
    }
  },
}));

function readPreferences(): Preferences {
  try {
    return Preferences.parse(JSON.parse(localStorage.getItem(place) ?? '{}'));
  } catch {
    return Preferences.parse({});
  }
}
