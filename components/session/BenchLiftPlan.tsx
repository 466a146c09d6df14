import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Choice } from '@/components/ui/Choice';
import { Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';
import { space } from '@/components/ui/tokens';
import type { LiftUnit, PlannedLift } from '@/shared/schema/primitives';
import type { BenchFormPart } from './benchForm';

const units: LiftUnit[] = ['in', 'mm', 'L/D'];

/** The lifts to test: by steps, typed one by one, or as last time. What comes out stands below at once. */
export function BenchLiftPlan({
  form,
  problems,
  onChange,
  liftUnit,
  lifts,
  hasLast,
}: BenchFormPart & {
  liftUnit: LiftUnit;
  /** what the form gives as it stands, or null */
  lifts: readonly PlannedLift[] | null;
  /** there is a session to take the lifts from */
  hasLast: boolean;
}) {
  return (
    <Stack gap="l">
      <Choice
        label="Lifts"
        options={[
          { value: 'steps', title: 'Equal steps' },
          { value: 'list', title: 'Typed one by one' },
          ...(hasLast ? [{ value: 'same' as const, title: 'Same as the last session' }] : []),
        ]}
        value={form.planKind}
        onChange={(planKind) => onChange({ planKind })}
      />
      {form.planKind === 'same' ? null : (
        <Choice<LiftUnit>
          label="In"
          layout="row"
          options={units.map((unit) => ({ value: unit, title: unit }))}
          value={liftUnit}
          onChange={(unit) => onChange({ liftUnit: unit })}
        />
      )}
      {form.planKind === 'steps' ? (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.m }}>
          {(
            [
              ['firstText', 'First'],
              ['stepText', 'Step'],
              ['lastText', 'Last'],
            ] as const
          ).map(([name, label]) => (
            <View key={name} style={{ flexGrow: 1, flexBasis: 80 }}>
              <TextField
                label={label}
                kind="decimal"
                maxLength={12}
                value={form[name]}
                onChange={(text) => onChange({ [name]: text })}
              />
            </View>
          ))}
        </View>
      ) : null}
      {form.planKind === 'list' ? (
        <TextField
          label="Lifts, with spaces between them"
          isMultiline
          value={form.listText}
          onChange={(listText) => onChange({ listText })}
        />
      ) : null}
      {problems.plan ? (
        <View role="alert">
          <AppText weight="600" color="redOxide">
            {problems.plan}
          </AppText>
        </View>
      ) : lifts ? (
        <AppText color="quietInk">
          {`${lifts.length === 1 ? '1 lift' : `${lifts.length} lifts`}: ${lifts.map((lift) => lift.text).join('  ')} ${lifts[0]?.unit ?? ''}`}
        </AppText>
      ) : null}
    </Stack>
  );
}
