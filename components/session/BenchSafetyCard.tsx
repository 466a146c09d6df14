import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Icon } from '@/components/ui/Icon';
import { Card, Stack } from '@/components/ui/Layout';
import { space } from '@/components/ui/tokens';

const cautions = [
  'Wear hearing and eye protection.',
  'Valve springs, spinning motors and hot vacuum sources can injure. The air itself can pull a valve open against a weak checking spring.',
  'Mind grinding dust.',
  'The shop’s own rules, local codes and the engine builder’s licensed judgement come first.',
  'Flow and power figures are for comparison. They do not make an engine safe to run at any speed.',
];

/** What is read before a session is keyed: once by each person. */
export function BenchSafetyCard({ isBusy, onRead }: { isBusy: boolean; onRead: () => void }) {
  return (
    <Card label="Before you start" gap="l">
      <AppText variant="heading" level={2}>
        Before you start
      </AppText>
      <Stack gap="m">
        {cautions.map((caution) => (
          <View key={caution} style={{ flexDirection: 'row', gap: space.m }}>
            <Icon name="attention" color="brass" size={28} />
            <AppText style={{ flex: 1 }}>{caution}</AppText>
          </View>
        ))}
      </Stack>
      <Button title="Read. Go on" kind="primary" isWide isBusy={isBusy} onPress={onRead} />
    </Card>
  );
}
