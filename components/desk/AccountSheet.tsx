import { useState } from 'react';
import { roleWord } from '@/components/session/words';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Stack } from '@/components/ui/Layout';
import { Sheet } from '@/components/ui/Sheet';
import type { ThemeChoice } from '@/components/ui/ThemeProvider';
import type { SignedIn } from '@/shared/schema/api';
import { problemOf } from './problemOf';

type Props = {
  signedIn: SignedIn;
  theme: ThemeChoice;
  onTheme: (theme: ThemeChoice) => void;
  signOut: (where: 'here' | 'everywhere') => Promise<void>;
  onClose: () => void;
};

/** Who is signed in, the theme, and the two ways out. */
export function AccountSheet({ signedIn, theme, onTheme, signOut, onClose }: Props) {
  const [error, setError] = useState<unknown>(null);
  const [busy, setBusy] = useState<'here' | 'everywhere' | null>(null);
  const leave = async (where: 'here' | 'everywhere') => {
    setBusy(where);
    setError(null);
    try {
      await signOut(where);
      onClose();
    } catch (refusal) {
      setError(refusal);
    } finally {
      setBusy(null);
    }
  };
  return (
    <Sheet title={signedIn.person.name} onClose={onClose}>
      <Stack gap="xs">
        <AppText>{signedIn.shop.name}</AppText>
        {signedIn.person.roles.map((role) => (
          <AppText key={role} variant="small" color="quietInk">
            {roleWord(role)}
          </AppText>
        ))}
      </Stack>
      <Choice<ThemeChoice>
        label="Theme"
        value={theme}
        onChange={onTheme}
        options={[
          { value: 'system', title: 'As the system' },
          { value: 'daylight', title: 'Daylight', detail: 'dark on light' },
          { value: 'shed', title: 'Shed', detail: 'light on dark' },
        ]}
      />
      {error ? (
        <Banner
          kind="refusal"
          sentence={`${problemOf(error, { offline: 'No network: the server has to end the sign-in.' }).sentence} You are still signed in.`}
        />
      ) : null}
      <Button
        title="Sign out"
        icon="door"
        isWide
        isBusy={busy === 'here'}
        onPress={() => void leave('here')}
      />
      <Button
        title="Sign out everywhere"
        isWide
        isBusy={busy === 'everywhere'}
        onPress={() => void leave('everywhere')}
      />
    </Sheet>
  );
}
