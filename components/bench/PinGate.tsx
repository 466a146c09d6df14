import { useEffect, useRef, useState } from 'react';
import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Stack } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { EmptyState } from '@/components/ui/States';
import { space } from '@/components/ui/tokens';
import { PinDots, pinLength, PinPad } from './PinPad';

export type PinPerson = { id: string; name: string; hasPin: boolean };
/** The same answer as the store gives: it never says which part was wrong. */
export type PinAnswer = { ok: true } | { wrong: true } | { waitSeconds: number };
export type PinGateProps = {
  shopName: string;
  people: PinPerson[];
  /** @throws with a sentence when the device could not look */
  onUnlock: (personId: string, pin: string) => Promise<PinAnswer>;
};

/** Who is at the bench: a name, then six digits. Works without a network. */
export function PinGate({ shopName, people, onUnlock }: PinGateProps) {
  const [personId, setPersonId] = useState<string | null>(null);
  const person = people.find((each) => each.id === personId);
  if (person)
    return <PinEntry key={person.id} person={person} onUnlock={onUnlock} onBack={() => setPersonId(null)} />;
  return (
    <Screen title="Who is at the bench?" subtitle={shopName} width="narrow">
      {people.length === 0 ? (
        <EmptyState
          title="No names yet"
          sentence="The names of the shop come with the first connection. Bring this device into the network once, then look again."
        />
      ) : (
        <Stack gap="m">
          {people.map((each) => (
            <Stack key={each.id} gap="xs">
              <Button
                title={each.name}
                isWide
                isDisabled={!each.hasPin}
                onPress={() => setPersonId(each.id)}
              />
              {each.hasPin ? null : (
                <AppText variant="small" color="quietInk">
                  {`No PIN yet for ${each.name}. It is set at the desk, under people.`}
                </AppText>
              )}
            </Stack>
          ))}
        </Stack>
      )}
    </Screen>
  );
}

function PinEntry({
  person,
  onUnlock,
  onBack,
}: {
  person: PinPerson;
  onUnlock: PinGateProps['onUnlock'];
  onBack: () => void;
}) {
  const [pin, setPin] = useState('');
  const [isBusy, setIsBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const [waitSeconds, setWaitSeconds] = useCountdown();
  const isWaiting = waitSeconds > 0;

  const change = async (next: string) => {
    setPin(next);
    if (next.length > 0) setProblem(null);
    if (next.length < pinLength) return;
    setIsBusy(true);
    try {
      const answer = await onUnlock(person.id, next);
      if ('ok' in answer) return;
      setPin('');
      if ('waitSeconds' in answer) setWaitSeconds(answer.waitSeconds);
      setProblem('wrong' in answer ? 'That did not match. Key the six digits again.' : null);
    } catch (error) {
      setPin('');
      setProblem(error instanceof Error ? error.message : 'The PIN could not be looked at. Try again.');
    } finally {
      setIsBusy(false);
    }
  };

  return (
    <Screen
      title={person.name}
      subtitle="Key your PIN"
      width="narrow"
      onBack={onBack}
      backLabel="Back to the names"
    >
      <View style={{ alignItems: 'center', gap: space.s }}>
        <PinDots count={pin.length} />
        {/* room that is always there: the keys must not move under a thumb when a sentence comes */}
        <View style={{ minHeight: 128, justifyContent: 'center', alignSelf: 'stretch' }}>
          {isWaiting ? (
            <Banner
              kind="attention"
              word="Wait"
              sentence={`Too many tries. Key it again in ${waitSeconds} s.`}
            />
          ) : problem ? (
            <Banner kind="refusal" word="Not in" sentence={problem} />
          ) : isBusy ? (
            <AppText isLive color="quietInk" align="center">
              Looking …
            </AppText>
          ) : null}
        </View>
        <PinPad pin={pin} isDisabled={isBusy || isWaiting} onChange={(next) => void change(next)} />
      </View>
    </Screen>
  );
}

/** Seconds that run down to nothing. */
function useCountdown(): [number, (seconds: number) => void] {
  const [seconds, setSeconds] = useState(0);
  const untilMs = useRef(0);
  const isRunning = seconds > 0;
  useEffect(() => {
    if (!isRunning) return;
    const timer = setInterval(
      () => setSeconds(Math.max(0, Math.ceil((untilMs.current - Date.now()) / 1000))),
      250,
    );
    return () => clearInterval(timer);
  }, [isRunning]);
  const start = (from: number) => {
    untilMs.current = Date.now() + from * 1000;
    setSeconds(Math.ceil(from));
  };
  return [seconds, start];
}
