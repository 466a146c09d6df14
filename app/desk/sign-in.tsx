import { Redirect } from 'expo-router';

/** The layout shows the sign-in here as at every desk address; who is signed in goes on to the sessions. */
export default function SignInRoute() {
  return <Redirect href="/desk" />;
}
