import { useEffect, useState } from 'react';
import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Card, Stack } from '@/components/ui/Layout';
import { QrCode } from '@/components/ui/QrCode';
import { space } from '@/components/ui/tokens';
import type { EnrolmentCode } from '@/shared/schema/api';
import { problemOf } from './problemOf';

type Props = {
  makeCode: () => Promise<EnrolmentCode>;
  /** address a tablet opens to enrol with a code */
  addressFor: (code: string) => string;
};

/** Lets a tablet into the shop: eight characters, keyed or photographed there within a quarter of an hour. */
export function EnrolmentCard({ makeCode, addressFor }: Props) {
  const [made, setMade] = useState<EnrolmentCode | null>(null);
  const [isBusy, setIsBusy] = useState(false);
  const [error, setError] = useState<unknown>(null);
  const leftSeconds = useSecondsUntil(made?.expiresAt ?? null);
  const make = async () => {
    setIsBusy(true);
    setError(null);
    try {
      setMade(await makeCode());
    } catch (refusal) {
      setError(refusal);
    } finally {
      setIsBusy(false);
    }
  };
  const isGood = made !== null && leftSeconds > 0;
  return (
    <Card label="Enrol a device">
      <AppText variant="heading" level={2}>
        Enrol a tablet or phone
      </AppText>
      <AppText color="quietInk">
        Make a code here, open the bench on the tablet, key the code there. It works once, for a quarter of an
        hour.
      </AppText>
      {error ? <Banner kind="refusal" sentence={problemOf(error).sentence} /> : null}
      {isGood ? (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.xl, alignItems: 'center' }}>
          <Stack gap="s">
            <AppText
              variant="display"
              isSelectable
              label={`Enrolment code: ${made.code.split('').join(' ')}`}
              style={{ letterSpacing: 2 }}
            >
              {`${made.code.slice(0, 4)} ${made.code.slice(4)}`}
            </AppText>
            <AppText>{`Good for ${clockOf(leftSeconds)}, for one device`}</AppText>
          </Stack>
          <QrCode
            text={addressFor(made.code)}
            sizePx={168}
            label="The same code, to be photographed with the tablet"
          />
        </View>
      ) : null}
      {made && !isGood ? <AppText>The code has run out. Make a new one.</AppText> : null}
      <Button
        title={made ? 'Make another code' : 'Make an enrolment code'}
        kind={isGood ? 'quiet' : 'primary'}
        isBusy={isBusy}
        onPress={() => void make()}
      />
    </Card>
  );
}

const clockOf = (seconds: number) => `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')}`;

function useSecondsUntil(atIso: string | null): number {
  const [left, setLeft] = useState(0);
  useEffect(() => {
    if (!atIso) return;
    const tick = () => setLeft(Math.max(0, Math.ceil((Date.parse(atIso) - Date.now()) / 1000)));
    tick();
    const timer = setInterval(tick, 1000);
    return () => clearInterval(timer);
  }, [atIso]);
  return left;
}
