import { Slot, usePathname, useRouter } from 'expo-router';
import { useEffect, useMemo, useState } from 'react';
import { View } from 'react-native';
import { AccountSheet } from '@/components/desk/AccountSheet';
import { DeskFrame } from '@/components/desk/DeskFrame';
import { placesAt } from '@/components/desk/deskPlaces';
import { DeskUnreachable } from '@/components/desk/DeskUnreachable';
import { KeysSheet } from '@/components/desk/KeysSheet';
import { SignInForm } from '@/components/desk/SignInForm';
import { SignInScreen } from '@/components/desk/SignInScreen';
import { useDeskKeys } from '@/components/desk/useDeskKeys';
import { Screen } from '@/components/ui/Screen';
import { Sheet } from '@/components/ui/Sheet';
import { Progress } from '@/components/ui/States';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { useDeskStore } from '@/stores/desk/deskStore';
import { useNewsStore } from '@/stores/desk/newsStore';
import { usePreferencesStore } from '@/stores/desk/preferencesStore';
import { useIsInside, useMay } from '@/stores/desk/useMay';
import { useDeskNews } from '@/stores/queries/deskQueries';

export default function DeskLayout() {
  const theme = usePreferencesStore((state) => state.theme);
  return (
    <ThemeProvider place="desk" choice={theme}>
      <Guarded />
    </ThemeProvider>
  );
}

/** Lets in who is signed in; everybody else finds the sign-in at the address they wanted. The routes are mounted all the
 * same, drawing nothing: without them the router would forget that address.
 */
function Guarded() {
  const { phase, start, signIn } = useDeskStore();
  const isInside = useIsInside();
  useEffect(() => {
    if (phase === 'starting') void start();
  }, [phase, start]);
  if (isInside) return <Inside />;
  return (
    <>
      <View style={{ display: 'none' }}>
        <Slot />
      </View>
      {phase === 'unreachable' ? (
        <DeskUnreachable onTryAgain={() => void start()} />
      ) : phase === 'starting' ? (
        <Screen title="Desk" width="narrow">
          <Progress label="The desk opens" />
        </Screen>
      ) : (
        <SignInScreen signIn={signIn} />
      )}
    </>
  );
}

/** The frame around every desk screen, for somebody who is, or was a moment ago, signed in. */
function Inside() {
  const { phase, signedIn, personOrdinal, signIn, signOut, leave } = useDeskStore();
  const isLive = useNewsStore((state) => state.isLive);
  const { theme, hasKeys, prefer } = usePreferencesStore();
  const path = usePathname();
  const router = useRouter();
  const [front, setFront] = useState<'account' | 'keys' | null>(null);
  useDeskNews();
  const mayPlan = useMay('planSession');
  const keys = useMemo(
    () => ({
      '?': () => setFront('keys'),
      p: hasKeys && mayPlan ? () => router.push('/desk/sessions/plan') : null,
    }),
    [hasKeys, mayPlan, router],
  );
  useDeskKeys(keys);
  if (!signedIn) return null;
  return (
    <DeskFrame
      places={placesAt(path)}
      shopName={signedIn.shop.name}
      personName={signedIn.person.name}
      {...(isLive
        ? {}
        : { notice: 'News do not come by themselves just now; the desk looks every 10 seconds.' })}
      onGo={(href) => router.push(href)}
      onAccount={() => setFront('account')}
    >
      <Slot key={personOrdinal} />
      {front === 'account' ? (
        <AccountSheet
          signedIn={signedIn}
          theme={theme}
          onTheme={(choice) => prefer({ theme: choice })}
          signOut={signOut}
          onClose={() => setFront(null)}
        />
      ) : null}
      {front === 'keys' ? (
        <KeysSheet
          areOn={hasKeys}
          onSwitch={(areOn) => prefer({ hasKeys: areOn })}
          onClose={() => setFront(null)}
        />
      ) : null}
      {phase === 'ended' ? (
        <Sheet title="Sign in again" closeTitle="Leave" onClose={leave}>
          <SignInForm
            reason="This sign-in has ended. What is on screen, and what you entered, stays; sign in to go on."
            signIn={signIn}
          />
        </Sheet>
      ) : null}
    </DeskFrame>
  );
}
