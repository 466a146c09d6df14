import { useState } from 'react';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Sheet } from '@/components/ui/Sheet';
import { TextField } from '@/components/ui/TextField';
import { Pin } from '@/shared/schema/api';
import { problemOf } from './problemOf';

type Props = {
  name: string;
  setPin: (pin: string) => Promise<unknown>;
  onDone: () => void;
  onClose: () => void;
};

/** Six digits, twice, because nobody sees them. */
export function PinSheet({ name, setPin, onDone, onClose }: Props) {
  const [pin, setPinText] = useState('');
  const [again, setAgain] = useState('');
  const [isChecked, setIsChecked] = useState(false);
  const [isBusy, setIsBusy] = useState(false);
  const [error, setError] = useState<unknown>(null);
  const pinProblem = Pin.safeParse(pin).success ? null : 'A PIN is six digits.';
  const againProblem = again === pin ? null : 'That is not the same PIN.';
  const submit = async () => {
    setIsChecked(true);
    setError(null);
    if (isBusy || pinProblem || againProblem) return;
    setIsBusy(true);
    try {
      await setPin(pin);
      onDone();
    } catch (refusal) {
      setError(refusal);
    } finally {
      setIsBusy(false);
    }
  };
  return (
    <Sheet title={`PIN of ${name}`} onClose={onClose} closeTitle="Not now">
      <AppText color="quietInk">
        Keyed at the bench, so that a reading carries the right name. It opens nothing at the desk.
      </AppText>
      {error ? (
        <Banner kind="refusal" sentence={`${problemOf(error).sentence} The PIN is as it was.`} />
      ) : null}
      <TextField
        label="New PIN"
        kind="pin"
        maxLength={6}
        autoComplete="new-password"
        value={pin}
        onChange={setPinText}
        problem={isChecked ? pinProblem : null}
        isFocusedFirst
      />
      <TextField
        label="The same PIN again"
        kind="pin"
        maxLength={6}
        autoComplete="new-password"
        value={again}
        onChange={setAgain}
        problem={isChecked && !pinProblem ? againProblem : null}
        onSubmit={() => void submit()}
      />
      <Button
        title={`Set the PIN of ${name}`}
        kind="primary"
        isWide
        isBusy={isBusy}
        onPress={() => void submit()}
      />
    </Sheet>
  );
}
