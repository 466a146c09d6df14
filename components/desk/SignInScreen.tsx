import { Card } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { SignInForm } from './SignInForm';

/** The sign-in. It stands in place of whatever desk address was wanted, so that the address is kept. */
export function SignInScreen({ signIn }: { signIn: (mail: string, password: string) => Promise<void> }) {
  return (
    <Screen
      title="Sign in at the desk"
      width="narrow"
      subtitle="For planning, reading and approving sessions"
    >
      <Card label="Sign in">
        <SignInForm signIn={signIn} />
      </Card>
    </Screen>
  );
}
