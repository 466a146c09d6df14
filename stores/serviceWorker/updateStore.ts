import { create } from 'zustand';

type UpdateState = {
  /** puts the waiting version in place and opens the page anew; null while there is none */
  apply: (() => void) | null;
  offer: (apply: () => void) => void;
};

/** Whether a newer version of the app waits to be used. It waits until a person takes it. */
export const useUpdateStore = create<UpdateState>()((set) => ({
  apply: null,
  offer: (apply) => set({ apply }),
}));
