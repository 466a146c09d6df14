import { Redirect } from 'expo-router';
import { useIsInside } from '@/stores/desk/useMay';

/** The layout shows the sign-in here as at every desk address; who is signed in goes on to the sessions. */
export default function SignInRoute() {
  return useIsInside() ? <Redirect href="/desk" /> : null;
}
