import { View, useWindowDimensions } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Icon, type IconName } from '@/components/ui/Icon';
import { PressArea } from '@/components/ui/PressArea';
import { Screen } from '@/components/ui/Screen';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';

/** The two ways in. */
export function FrontDoor({ onBench, onDesk }: { onBench: () => void; onDesk: () => void }) {
  const { width } = useWindowDimensions();
  return (
    <Screen title="Inchwater" subtitle="The logbook of the flow bench" width="reading">
      <View style={{ flexDirection: width >= 700 ? 'row' : 'column', gap: space.l }}>
        <Way
          title="Bench"
          sentence="Key readings on this device, with or without a network."
          icon="note"
          href="/bench"
          onPress={onBench}
        />
        <Way
          title="Desk"
          sentence="See what came in, plan sessions, keep the shop in order. Needs a sign-in."
          icon="door"
          href="/desk"
          onPress={onDesk}
        />
      </View>
    </Screen>
  );
}

type WayProps = { title: string; sentence: string; icon: IconName; href: string; onPress: () => void };

function Way({ title, sentence, icon, href, onPress }: WayProps) {
  const { colors } = useTheme();
  return (
    <PressArea onPress={onPress} href={href} style={{ flex: 1 }}>
      {(isPressed) => (
        <View
          style={{
            flexGrow: 1,
            minHeight: 148,
            gap: space.s,
            padding: space.xl,
            borderRadius: radius.card,
            borderWidth: stroke.strong,
            borderColor: colors.markingBlue,
            backgroundColor: isPressed ? colors.pressed : colors.surface,
          }}
        >
          <View style={{ flexDirection: 'row', alignItems: 'center', gap: space.m }}>
            <Icon name={icon} size={28} color="markingBlue" />
            <AppText size={28} weight="800" color="markingBlue">
              {title}
            </AppText>
          </View>
          <AppText size={18}>{sentence}</AppText>
        </View>
      )}
    </PressArea>
  );
}
