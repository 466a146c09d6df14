import { useState } from 'react';
import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';
import { space } from '@/components/ui/tokens';
import type { DecimalMark, LiftUnit } from '@/shared/schema/primitives';
import { readLiftPlan, stepPlan } from './liftPlan';

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
  const filled = stepPlan(steps.from, steps.to, steps.step, decimalMark);
  const plan = readLiftPlan(text, unit);
  const isStepsWritten = Boolean(steps.from && steps.to && steps.step);
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
              label={part === 'step' ? 'in steps of' : part}
              kind="decimal"
              value={steps[part]}
              onChange={(value) => setSteps({ ...steps, [part]: value })}
            />
          </View>
        ))}
        <Button
          title="Fill in"
          isDisabled={filled === null}
          onPress={() => filled !== null && onText(filled)}
        />
      </View>
      {isStepsWritten && filled === null ? (
        <AppText variant="small" color="quietInk">
          These three do not make a plan: the end lies above the start, and 60 lifts are the most.
        </AppText>
      ) : null}
      <TextField
        label="Lift plan"
        hint="Divided by spaces, lowest first; kept exactly as written"
        isMultiline
        value={text}
        onChange={onText}
        problem={isChecked || text.trim() ? plan.problem : null}
      />
      {plan.problem === null ? (
        <AppText variant="small" color="quietInk">{`${plan.lifts.length} lifts`}</AppText>
      ) : null}
    </Stack>
  );
}
