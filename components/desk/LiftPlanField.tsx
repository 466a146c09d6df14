import { useState } from 'react';
import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';
import { space } from '@/components/ui/tokens';
import type { DecimalMark, LiftUnit } from '@/shared/schema/primitives';
import { liftsBySteps, liftsFromList } from '@/shared/session/liftPlan';

const stepLabels = { from: 'From', to: 'To', step: 'Step' } as const;

type Props = {
  text: string;
  unit: LiftUnit;
  decimalMark: DecimalMark;
  /** shown once somebody tried to plan */
  isChecked: boolean;
  onText: (text: string) => void;
  onUnit: (unit: LiftUnit) => void;
};

/** The lifts to pull: written out, or filled in equal steps. */
export function LiftPlanField({ text, unit, decimalMark, isChecked, onText, onUnit }: Props) {
  const [steps, setSteps] = useState({ from: '', to: '', step: '' });
  const filled = liftsBySteps(
    { firstText: steps.from, lastText: steps.to, stepText: steps.step, unit },
    decimalMark,
  );
  const plan = liftsFromList(text, unit, decimalMark);
  const areStepsWritten = Boolean(steps.from && steps.to && steps.step);
  const fill = () => {
    if ('lifts' in filled) onText(filled.lifts.map((lift) => lift.text).join(' '));
  };
  return (
    <Stack gap="m">
      <Choice<LiftUnit>
        label="Lifts in"
        layout="row"
        value={unit}
        onChange={onUnit}
        options={[
          { value: 'in', title: 'in' },
          { value: 'mm', title: 'mm' },
          { value: 'L/D', title: 'L/D' },
        ]}
      />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.m, alignItems: 'flex-end' }}>
        {(['from', 'to', 'step'] as const).map((part) => (
          <View key={part} style={{ flexGrow: 1, flexBasis: 90 }}>
            <TextField
              label={stepLabels[part]}
              kind="decimal"
              value={steps[part]}
              onChange={(value) => setSteps({ ...steps, [part]: value })}
            />
          </View>
        ))}
        <Button
          title="Fill in"
          isDisabled={!('lifts' in filled)}
          onPress={fill}
          style={{ alignSelf: 'flex-end' }}
        />
      </View>
      {areStepsWritten && 'sentence' in filled ? (
        <AppText variant="small" weight="600" color="redOxide">
          {filled.sentence}
        </AppText>
      ) : null}
      <TextField
        label="Lift plan"
        hint="Divided by spaces, lowest first; kept exactly as written"
        isMultiline
        value={text}
        onChange={onText}
        problem={(isChecked || text.trim()) && 'sentence' in plan ? plan.sentence : null}
      />
      {'lifts' in plan ? (
        <AppText variant="small" color="quietInk">{`${plan.lifts.length} lifts`}</AppText>
      ) : null}
    </Stack>
  );
}
