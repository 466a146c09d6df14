import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Icon, type IconName } from '@/components/ui/Icon';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';
import type { CaptureLayout } from './captureLayout';

/** What to set now: the lift, large, between the key of the column and the key of everything rarer. */
export function PromptRow({
  layout,
  liftText,
  liftUnit,
  place,
  onOpenRungs,
  onOpenMore,
}: {
  layout: CaptureLayout;
  liftText: string | null;
  liftUnit: string;
  /** "Intake 1 · 3 of 10" */
  place: string;
  /** absent where the rungs stand beside the pad */
  onOpenRungs?: () => void;
  onOpenMore: () => void;
}) {
  const { size, control } = layout;
  return (
    <View
      style={{
        height: layout.promptHeight,
        flexDirection: 'row',
        alignItems: 'center',
        gap: space.s,
      }}
    >
      {onOpenRungs ? <SideKey icon="column" word="lifts" layout={layout} onPress={onOpenRungs} /> : null}
      <View style={{ flex: 1, minWidth: 0, alignItems: onOpenRungs ? 'center' : 'flex-start' }}>
        <AppText size={size.prompt} lineHeight={size.prompt + 2} weight="800" lines={1} isLive>
          {liftText ?? 'All done'}
          {liftText === null ? null : (
            <AppText size={control === 64 ? 24 : 28} weight="600" color="quietInk">
              {` ${liftUnit}`}
            </AppText>
          )}
        </AppText>
        <AppText
          size={size.small}
          lineHeight={size.small + 4}
          color="quietInk"
          weight="400"
          level={1}
          lines={1}
        >
          {place}
        </AppText>
      </View>
      <SideKey icon="more" word="more" layout={layout} onPress={onOpenMore} />
    </View>
  );
}

function SideKey({
  icon,
  word,
  layout,
  onPress,
}: {
  icon: IconName;
  word: string;
  layout: CaptureLayout;
  onPress: () => void;
}) {
  const { colors } = useTheme();
  const side = layout.control;
  return (
    <PressArea isKey onPress={onPress} style={{ width: side, height: side, paddingVertical: space.hair }}>
      {(isPressed) => (
        <View
          style={{
            flex: 1,
            alignItems: 'center',
            justifyContent: 'center',
            borderRadius: radius.key,
            borderWidth: stroke.line,
            borderColor: colors.line,
            backgroundColor: isPressed ? colors.pressed : colors.surface,
          }}
        >
          <Icon name={icon} size={side === 64 ? 26 : 32} />
          <AppText size={layout.size.small} lineHeight={layout.size.small + 2} weight="600">
            {word}
          </AppText>
        </View>
      )}
    </PressArea>
  );
}
