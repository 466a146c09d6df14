import { useState } from 'react';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Card, Stack } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { TextField } from '@/components/ui/TextField';

export type EnrolProblem = { sentence: string; code?: string; deviceName?: string };
export type EnrolFormProps = {
  /** what a link or a QR brought along */
  startCode?: string;
  startName?: string;
  /** what this browser cannot promise */
  warnings: string[];
  /** set when it is enrolled already and has to be enrolled again */
  isAgain: boolean;
  /** resolves with what was wrong, or null */
  onEnrol: (code: string, deviceName: string) => Promise<EnrolProblem | null>;
  onBack: () => void;
};

/** Makes this browser a device of the shop: once, with the network. */
export function EnrolForm(props: EnrolFormProps) {
  const [code, setCode] = useState(props.startCode ?? '');
  const [deviceName, setDeviceName] = useState(props.startName ?? '');
  const [problem, setProblem] = useState<EnrolProblem | null>(null);
  const [isBusy, setIsBusy] = useState(false);

  const enrol = async () => {
    const missing: EnrolProblem = {
      sentence: '',
      ...(code.trim() === '' ? { code: 'Type the code from the desk.' } : {}),
      ...(deviceName.trim() === '' ? { deviceName: 'Give this device a name, such as “Tablet 2”.' } : {}),
    };
    if (missing.code || missing.deviceName) return setProblem(missing);
    setIsBusy(true);
    setProblem(null);
    setProblem(await props.onEnrol(code.trim(), deviceName.trim()));
    setIsBusy(false);
  };

  return (
    <Screen
      title={props.isAgain ? 'Enrol this device again' : 'Enrol this device'}
      width="narrow"
      onBack={props.onBack}
      backLabel="Back"
    >
      <AppText>
        {props.isAgain
          ? 'The shop no longer knows this device. The readings on it stay and are sent after it is enrolled again.'
          : 'Once, with the network. After that the bench works without one.'}
      </AppText>
      {props.warnings.map((sentence) => (
        <Banner key={sentence} kind="attention" sentence={sentence} />
      ))}
      <Card label="Enrolment">
        <Stack gap="l">
          <TextField
            label="Code"
            hint="Eight letters and digits. A supervisor makes it at the desk, under Devices; it holds for 15 minutes."
            value={code}
            onChange={setCode}
            problem={problem?.code}
            maxLength={20}
            autoComplete="one-time-code"
          />
          <TextField
            label="Name of this device"
            hint="As the shop calls it, such as “Tablet 2”."
            value={deviceName}
            onChange={setDeviceName}
            problem={problem?.deviceName}
            maxLength={120}
            onSubmit={() => void enrol()}
          />
          {problem?.sentence ? <Banner kind="refusal" sentence={problem.sentence} /> : null}
          <Button
            title="Enrol this device"
            kind="primary"
            isWide
            isBusy={isBusy}
            onPress={() => void enrol()}
          />
        </Stack>
      </Card>
    </Screen>
  );
}
