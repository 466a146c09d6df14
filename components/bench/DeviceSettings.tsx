import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Card, Stack } from '@/components/ui/Layout';

type Theme = 'system' | 'daylight' | 'shed';
const bounceChoices = [50, 80, 150, 250];

/** What can be chosen for this device, and who stands at it. */
export function DeviceSettings(props: {
  shopName: string;
  deviceName: string;
  personName: string;
  theme: Theme;
  bounceMs: number;
  onTheme: (theme: Theme) => void;
  onBounceMs: (bounceMs: number) => void;
  onChangePerson: () => void;
}) {
  return (
    <Stack gap="xl">
      <Card label="This device">
        <AppText>{`${props.deviceName}, a device of ${props.shopName}.`}</AppText>
        <AppText>{`At the bench: ${props.personName}.`}</AppText>
        <Button title="Change person" icon="door" isWide onPress={props.onChangePerson} />
      </Card>
      <Choice
        label="Light"
        options={[
          { value: 'daylight', title: 'Daylight', detail: 'dark on light' },
          { value: 'shed', title: 'Shed', detail: 'light on dark, for the evening' },
          { value: 'system', title: 'As the device has it' },
        ]}
        value={props.theme}
        onChange={props.onTheme}
      />
      <Choice
        label="A key pressed twice by a slip"
        options={bounceChoices.map((each) => ({
          value: String(each),
          title: `${each} ms`,
          ...(each === 80 ? { detail: 'as usual' } : each === 250 ? { detail: 'thick gloves' } : {}),
        }))}
        value={String(props.bounceMs)}
        onChange={(each) => props.onBounceMs(Number(each))}
      />
      <AppText color="quietInk">
        The same key again within this time counts once; the pad then says “Repeat ignored”.
      </AppText>
    </Stack>
  );
}
