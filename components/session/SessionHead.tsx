import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Card } from '@/components/ui/Layout';
import { space } from '@/components/ui/tokens';
import type { SessionView } from '@/shared/schema/views';
import { gradeWord } from './words';

/** What a session was measured on, and by which bench. */
export function SessionHead({ view }: { view: SessionView }) {
  const { session, customer, head, stage, bench, people } = view;
  const { settings } = session;
  const plannedBy = people.find((person) => person.id === session.plannedBy)?.name;
  const facts: [string, string][] = [
    ['Customer', customer.name],
    ['Head', head.casting ? `${head.name} (${head.casting})` : head.name],
    ['Stage', stage.name],
    ['Bench', bench.status === 'inUse' ? bench.name : `${bench.name}: ${benchStanding[bench.status]}`],
    ['Standard pressure', `${settings.standardPressureText} ${settings.standardPressureUnit}`],
  ];
  const longFacts: [string, string][] = [['Calibration', calibrationWords(view)]];
  if (plannedBy) facts.push(['Planned by', plannedBy]);
  if (session.note) longFacts.push(['Note', session.note]);
  return (
    <Card label="What it was measured on" gap="s">
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space.l, rowGap: space.s }}>
        {facts.map(([name, value]) => (
          <Fact key={name} name={name} value={value} basisPx={130} />
        ))}
      </View>
      {longFacts.map(([name, value]) => (
        <Fact key={name} name={name} value={value} />
      ))}
    </Card>
  );
}

function Fact({ name, value, basisPx }: { name: string; value: string; basisPx?: number }) {
  return (
    <View style={basisPx ? { flexGrow: 1, flexBasis: basisPx, maxWidth: '100%' } : {}}>
      <AppText variant="small" color="quietInk">
        {name}
      </AppText>
      <AppText variant="label">{value}</AppText>
    </View>
  );
}

const benchStanding = { needsCheck: 'needs a check', outOfUse: 'out of use' } as const;

/** The grade of each direction in use, said once when both are alike; without any, what that means for the figures. */
function calibrationWords({ session, runs }: SessionView): string {
  const used = (['drawing', 'blowing'] as const).filter(
    (direction) =>
      session.settings[direction] !== null || runs.some(({ run }) => run.direction === direction),
  );
  const said = used.map((direction) => {
    const copied = session.settings[direction];
    return copied ? `${gradeWord(copied.grade)}; factor ${copied.fit.factorText}` : gradeWord('none');
  });
  if (said.length === 0) return gradeWord('none');
  if (said.every((words) => words === said[0])) return `${used.join(' and ')} ${said[0]}`;
  return used.map((direction, at) => `${direction} ${said[at]}`).join(' · ');
}
