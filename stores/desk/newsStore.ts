import { create } from 'zustand';

type NewsState = {
  /** whether news come by themselves; otherwise the desk looks every few seconds */
  isLive: boolean;
  setLive: (isLive: boolean) => void;
};

export const useNewsStore = create<NewsState>()((set) => ({
  isLive: true,
  setLive: (isLive) => set({ isLive }),
}));
