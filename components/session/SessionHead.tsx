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
    ['Calibration', calibrationWords(view)],
    ['Standard pressure', `${settings.standardPressureText} ${settings.standardPressureUnit}`],
  ];
  if (plannedBy) facts.push(['Planned by', plannedBy]);
  if (session.note) facts.push(['Note', session.note]);
  return (
    <Card label="What it was measured on" gap="s">
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space.xl, rowGap: space.s }}>
        {facts.map(([name, value]) => (
          <View key={name} style={{ minWidth: 180, maxWidth: '100%', flexGrow: 1, flexBasis: 200 }}>
            <AppText variant="small" color="quietInk">
              {name}
            </AppText>
            <AppText weight="600">{value}</AppText>
          </View>
        ))}
      </View>
    </Card>
  );
}

const benchStanding = { needsCheck: 'needs a check', outOfUse: 'out of use' } as const;

/** The grade in each direction that has one; without any, what that means for the figures. */
function calibrationWords({ session, runs }: SessionView): string {
  const { drawing, blowing } = session.settings;
  const parts: string[] = [];
  if (drawing) parts.push(`drawing ${gradeWord(drawing.grade)}, factor ${drawing.fit.factorText}`);
  if (blowing) parts.push(`blowing ${gradeWord(blowing.grade)}, factor ${blowing.fit.factorText}`);
  if (parts.length === 0) return gradeWord('none');
  const isMissing = (['drawing', 'blowing'] as const).find(
    (direction) => !session.settings[direction] && runs.some(({ run }) => run.direction === direction),
  );
  if (isMissing) parts.push(`${isMissing} ${gradeWord('none')}`);
  return parts.join('; ');
}
