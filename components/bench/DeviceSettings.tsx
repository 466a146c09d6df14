import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Card, Stack } from '@/components/ui/Layout';
import { useTheme } from '@/components/ui/ThemeProvider';

type Theme = 'system' | 'daylight' | 'shed';
type KeySize = 'normal' | 'large';
/** 20 mm at the 96 px an inch that browsers count with; the ruler on the glass says whether that holds here. */
const rulerPx = (20 / 25.4) * 96;

/** What can be chosen for this device, and who stands at it. */
export function DeviceSettings(props: {
  shopName: string;
  deviceName: string;
  personName: string;
  theme: Theme;
  keySize: KeySize;
  onTheme: (theme: Theme) => void;
  onKeySize: (size: KeySize) => void;
  onChangePerson: () => void;
}) {
  const { colors, isTablet } = useTheme();
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
      {isTablet ? (
        <Stack gap="m">
          <Choice
            label="Keys"
            layout="row"
            options={[
              { value: 'normal', title: 'Normal' },
              { value: 'large', title: 'Large' },
            ]}
            value={props.keySize}
            onChange={props.onKeySize}
          />
          <AppText color="quietInk">
            This bar should measure 20 mm. If it is shorter on your glass, take the large keys.
          </AppText>
          <View
            role="img"
            aria-label="Ruler of 20 millimetres"
            style={{ width: rulerPx, height: 24, backgroundColor: colors.ink }}
          />
        </Stack>
      ) : null}
    </Stack>
  );
}
