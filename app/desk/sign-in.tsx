import { SignInForm } from '@/components/desk/SignInForm';
import { Card } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { useDeskStore } from '@/stores/desk/deskStore';

export default function SignInRoute() {
  const signIn = useDeskStore((state) => state.signIn);
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
