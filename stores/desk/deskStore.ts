import { create } from 'zustand';
import { AppError } from '@/shared/errors';
import type { SignedIn } from '@/shared/schema/api';
import { askRefresh, askSignIn, askSignOut, askSignOutEverywhere } from './authCalls';
import { openTabChannel, withTabLock } from './tabLock';

/* Who is signed in at the desk. The access token lives in this tab's memory only; the cookie renews it, one tab at a
 * time, because a refresh token that is used twice ends the whole sign-in.
 *
 * starting → signedIn | signedOut | unreachable (no answer yet) ; signedIn → ended (the server ended it: screens stay
 * as they are, with the sign-in over them) | signedOut (the person left: nothing stays).
 */
export type DeskPhase = 'starting' | 'signedIn' | 'ended' | 'signedOut' | 'unreachable';

type DeskState = {
  phase: DeskPhase;
  /** kept while `ended`, so that screens stand as they were */
  signedIn: SignedIn | null;
  /** counts the people who came and went: screens of one are never shown to the next */
  personOrdinal: number;
  /** picks up the sign-in this browser holds, if any */
  start: () => Promise<void>;
  signIn: (mail: string, password: string) => Promise<void>;
  signOut: (where: 'here' | 'everywhere') => Promise<void>;
  /** goes on without signing in again after the server ended the sign-in */
  leave: () => void;
  /** a token that still holds; `refused` is one the server just turned away */
  freshToken: (refused?: string) => Promise<string>;
};

const refreshBeforeMs = 60_000;
const leastRefreshMs = 20_000;
const tabs = openTabChannel('inchwater-desk');

let refreshing: Promise<SignedIn> | null = null;
let refreshedAt = 0;
let timer: ReturnType<typeof setTimeout> | undefined;

export const useDeskStore = create<DeskState>()((set, get) => {
  const take = (signedIn: SignedIn) => {
    const before = get();
    const isSamePerson = before.signedIn?.person.id === signedIn.person.id;
    refreshedAt = Date.now();
    set({
      phase: 'signedIn',
      signedIn,
      personOrdinal: before.personOrdinal + (isSamePerson ? 0 : 1),
    });
    clearTimeout(timer);
    const leftMs = Date.parse(signedIn.expiresAt) - Date.now() - refreshBeforeMs;
    // a failed renewal shows at the next request, which tries again
    timer = setTimeout(() => void refresh().catch(() => undefined), Math.max(leftMs, leastRefreshMs));
  };
  const leave = (phase: 'ended' | 'signedOut') => {
    clearTimeout(timer);
    set(phase === 'ended' ? { phase } : { phase, signedIn: null, personOrdinal: get().personOrdinal + 1 });
  };
  const refresh = (): Promise<SignedIn> => {
    refreshing ??= withTabLock('inchwater-desk-refresh', askRefresh)
      .then(
        (signedIn) => {
          take(signedIn);
          return signedIn;
        },
        (error: unknown) => {
          if (isSignInOver(error)) leave(get().signedIn ? 'ended' : 'signedOut');
          throw error;
        },
      )
      .finally(() => (refreshing = null));
    return refreshing;
  };
  tabs?.addEventListener('message', (event: MessageEvent<unknown>) => {
    if (event.data === 'signedOut') leave('signedOut');
    if (event.data === 'signedIn' && get().phase !== 'signedIn') void refresh().catch(() => undefined);
  });

  return {
    phase: 'starting',
    signedIn: null,
    personOrdinal: 0,
    start: async () => {
      try {
        await refresh();
      } catch (error) {
        if (!isSignInOver(error)) set({ phase: 'unreachable' });
      }
    },
    signIn: async (mail, password) => {
      take(await withTabLock('inchwater-desk-refresh', () => askSignIn(mail, password)));
      tabs?.postMessage('signedIn');
    },
    signOut: async (where) => {
      const token = await get().freshToken();
      await (where === 'everywhere' ? askSignOutEverywhere(token) : askSignOut(token));
      leave('signedOut');
      tabs?.postMessage('signedOut');
    },
    leave: () => leave('signedOut'),
    freshToken: async (refused) => {
      const held = get().signedIn;
      if (held && get().phase === 'signedIn' && held.accessToken !== refused) {
        const isOver = Date.parse(held.expiresAt) - Date.now() < 5_000;
        // with a wrong clock every token looks over: one that came a moment ago is used all the same
        if (!isOver || Date.now() - refreshedAt < leastRefreshMs) return held.accessToken;
      }
      return (await refresh()).accessToken;
    },
  };
});

/** Whether the server said that this sign-in, or none, is at an end. */
export function isSignInOver(error: unknown): boolean {
  return error instanceof AppError && (error.code === 'sign_in_needed' || error.code === 'sign_in_ended');
}
