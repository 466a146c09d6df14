import { View } from 'react-native';
import { Choice } from '@/components/ui/Choice';
import { Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';
import { space } from '@/components/ui/tokens';
import type { LengthUnit } from '@/shared/schema/primitives';
import type { NewSessionForm } from '@/shared/session/newSessionForm';
import type { BenchFormPart } from './benchForm';

/** A head the shop does not know yet. Its ports are numbered by its cylinders until somebody names them. */
export function BenchNewHead({
  form,
  problems,
  onChange,
  numberedPorts,
}: BenchFormPart & {
  /** names that the number of cylinders gives */
  numberedPorts: string;
}) {
  const field = (name: keyof NewSessionForm) => ({
    value: String(form[name] ?? ''),
    onChange: (text: string) => onChange({ [name]: text }),
    problem: problems[name] ?? null,
  });
  return (
    <Stack gap="l">
      <TextField label="Head" hint="As the shop calls it" maxLength={120} {...field('headName')} />
      <TextField
        label="Casting"
        hint="Number or mark on the part; may stay empty"
        maxLength={120}
        {...field('casting')}
      />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.m, alignItems: 'flex-end' }}>
        {(
          [
            ['cylindersText', 'Cylinders'],
            ['intakeValvesText', 'Intake valves a port'],
            ['exhaustValvesText', 'Exhaust valves a port'],
          ] as const
        ).map(([name, label]) => (
          <View key={name} style={{ flexGrow: 1, flexBasis: 140 }}>
            <TextField label={label} kind="whole" maxLength={2} {...field(name)} />
          </View>
        ))}
      </View>
      <TextField
        label="Intake ports"
        hint="Names with spaces between them"
        {...field('intakePortsText')}
        value={form.intakePortsText ?? numberedPorts}
      />
      <TextField
        label="Exhaust ports"
        hint="Empty when it has none"
        {...field('exhaustPortsText')}
        value={form.exhaustPortsText ?? numberedPorts}
      />
    </Stack>
  );
}

/** The stage of the head, and its valves as far as they are known. */
export function BenchNewStage({ form, problems, onChange }: BenchFormPart) {
  return (
    <Stack gap="l">
      <TextField
        label="Stage"
        hint="Such as “As received” or “Bowl blended”"
        maxLength={120}
        value={form.stageName}
        onChange={(stageName) => onChange({ stageName })}
        problem={problems.stageName}
      />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.m }}>
        {(
          [
            ['intakeDiameterText', 'Intake valve'],
            ['exhaustDiameterText', 'Exhaust valve'],
          ] as const
        ).map(([name, label]) => (
          <View key={name} style={{ flexGrow: 1, flexBasis: 200 }}>
            <TextField
              label={label}
              hint="Diameter; may stay empty"
              kind="decimal"
              maxLength={12}
              unit={form.diameterUnit}
              value={form[name]}
              onChange={(text) => onChange({ [name]: text })}
              problem={problems[name]}
            />
          </View>
        ))}
      </View>
      <Choice<LengthUnit>
        label="Valve diameters in"
        layout="row"
        options={[
          { value: 'in', title: 'in' },
          { value: 'mm', title: 'mm' },
        ]}
        value={form.diameterUnit}
        onChange={(diameterUnit) => onChange({ diameterUnit })}
      />
    </Stack>
  );
}
