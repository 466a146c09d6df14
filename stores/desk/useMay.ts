import { may, type Act } from '@/shared/access';
import { useDeskStore } from './deskStore';

/** Whether the person signed in may do this; screens hide by it, the server refuses by it. */
export const useMay = (act: Act): boolean =>
  useDeskStore((state) => (state.signedIn ? may(state.signedIn.person.roles, act) : false));

/** Whether the desk shows itself: somebody is signed in, or was until a moment ago and may go on. */
export const useIsInside = (): boolean => useDeskStore((state) => state.signedIn !== null);
