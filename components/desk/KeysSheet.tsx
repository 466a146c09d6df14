import { AppText } from '@/components/ui/AppText';
import { Choice } from '@/components/ui/Choice';
import { Row } from '@/components/ui/Layout';
import { Sheet } from '@/components/ui/Sheet';

const keys: [string, string][] = [
  ['?', 'this list'],
  ['/', 'find a session'],
  ['J', 'next session in the list'],
  ['K', 'previous session in the list'],
  ['P', 'plan a session'],
  ['Up, Down', 'walk the rows of a table'],
  ['Enter', 'open the working of a row'],
  ['Esc', 'close what lies in front'],
];

type Props = { areOn: boolean; onSwitch: (areOn: boolean) => void; onClose: () => void };

/** The keys of the desk, and the switch for those whom single letters disturb. */
export function KeysSheet({ areOn, onSwitch, onClose }: Props) {
  return (
    <Sheet title="Keys" onClose={onClose}>
      {keys.map(([key, what]) => (
        <Row key={key} isWrapping={false} gap="l">
          <AppText weight="800" style={{ width: 110 }}>
            {key}
          </AppText>
          <AppText style={{ flex: 1 }}>{what}</AppText>
        </Row>
      ))}
      <Choice
        label="Single letters"
        layout="row"
        value={areOn ? 'on' : 'off'}
        onChange={(value) => onSwitch(value === 'on')}
        options={[
          { value: 'on', title: 'On' },
          { value: 'off', title: 'Off' },
        ]}
      />
    </Sheet>
  );
}
