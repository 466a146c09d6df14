import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Screen } from '@/components/ui/Screen';
import { ErrorState } from '@/components/ui/States';

/** Shown instead of a screen that had a fault. What was keyed is on the device; the half-keyed digits stand here too. */
export function FaultScreen({
  details,
  keyed,
  onTryAgain,
  onHome,
}: {
  details: string;
  /** half-keyed digits: where they belong and what they are */
  keyed: { lift: string; flowText: string; pressureText: string } | null;
  onTryAgain: () => void;
  onHome: () => void;
}) {
  return (
    <Screen title="This screen had a fault" width="narrow">
      {keyed ? (
        <Banner
          kind="attention"
          word="Half-keyed"
          sentence={`Lift ${keyed.lift}: flow ${keyed.flowText || 'not keyed'}, pressure ${keyed.pressureText || 'not keyed'}. The run opens with these digits.`}
        />
      ) : null}
      <AppText>Everything that was saved is still on this device.</AppText>
      <ErrorState
        sentence="The fault is in the app, not in what you did. Open the screen again; if it comes back, hand on the details."
        details={details}
        onTryAgain={onTryAgain}
        againTitle="Open it again"
      />
      <Button title="Go to the start" onPress={onHome} />
    </Screen>
  );
}
