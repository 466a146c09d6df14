import { useState } from 'react';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Stack } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { ErrorState, Progress } from '@/components/ui/States';

/** The database of this device is being opened. */
export function BenchOpening() {
  return (
    <Screen title="Bench" width="narrow">
      <Progress label="Opening what is saved on this device" />
    </Screen>
  );
}

/** Another tab or window has this device's database. */
export function BenchOtherTab({ onUseHere, onHome }: { onUseHere: () => void; onHome: () => void }) {
  const [isAsked, setIsAsked] = useState(false);
  return (
    <Screen title="The bench is open in another tab" width="narrow">
      <AppText>
        Only one tab can key readings on this device. Nothing is lost: what was keyed there is saved.
      </AppText>
      <Stack gap="m">
        <Button
          title="Use it here"
          kind="primary"
          isWide
          isBusy={isAsked}
          onPress={() => {
            setIsAsked(true);
            onUseHere();
          }}
        />
        <Button title="Leave it there" isWide onPress={onHome} />
      </Stack>
      {isAsked ? <AppText isLive>The other tab finishes writing and hands over.</AppText> : null}
    </Screen>
  );
}

/** The storage of the browser does not open. */
export function BenchFailed({
  sentence,
  onTryAgain,
  onKeepCopy,
}: {
  sentence: string;
  onTryAgain: () => void;
  /** resolves false when no copy could be made */
  onKeepCopy: () => Promise<boolean>;
}) {
  const [copy, setCopy] = useState<'no' | 'made' | 'failed'>('no');
  return (
    <Screen title="The bench does not open" width="narrow">
      <ErrorState sentence={sentence} details={sentence} onTryAgain={onTryAgain} />
      <Button
        title="Keep a copy as a file"
        icon="down"
        isWide
        onPress={() => void onKeepCopy().then((isMade) => setCopy(isMade ? 'made' : 'failed'))}
      />
      {copy === 'made' ? (
        <Banner kind="done" sentence="The file holds every change that is not sent yet." />
      ) : null}
      {copy === 'failed' ? (
        <Banner
          kind="refusal"
          sentence="No copy could be made, because the database does not open. Nothing on it was removed. Close the browser, open it again and look once more."
        />
      ) : null}
    </Screen>
  );
}
