import { create } from 'zustand';
import { emptyForm, NewSessionForm } from '@/shared/session/newSessionForm';

type NewSessionState = {
  form: NewSessionForm;
  change: (change: Partial<NewSessionForm>) => void;
  /** the session was started */
  clear: () => void;
};

const place = 'inchwater.bench.newSession';

/** What is typed for a session that is not started yet; it outlives a reload. */
export const useNewSessionStore = create<NewSessionState>()((set, get) => ({
  form: readForm(),
  change: (change) => {
    set({ form: { ...get().form, ...change } });
    keep(get().form);
  },
  clear: () => {
    set({ form: emptyForm });
    keep(null);
  },
}));

function readForm(): NewSessionForm {
  try {
    return NewSessionForm.catch(emptyForm).parse(JSON.parse(localStorage.getItem(place) ?? 'null'));
  } catch {
    return emptyForm;
  }
}

function keep(form: NewSessionForm | null): void {
  try {
    if (form) localStorage.setItem(place, JSON.stringify(form));
    else localStorage.removeItem(place);
  } catch {
    // a browser that keeps nothing: the form holds until the page is closed
  }
}
