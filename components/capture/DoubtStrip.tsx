import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Icon } from '@/components/ui/Icon';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';
import type { CaptureLayout } from './captureLayout';
import type { ShownDoubt } from './captureProps';

/** A second look at what was just saved: the reason in one line and at most three answers. Keying on keeps it. */
export function DoubtStrip({
  layout,
  doubt,
  height,
  onAnswer,
}: {
  layout: CaptureLayout;
  doubt: ShownDoubt;
  /** of what it covers; without it, its own */
  height?: number;
  onAnswer: (answerId: string) => void;
}) {
  const { colors } = useTheme();
  const { small } = layout.size;
  return (
    <View
      role="alert"
      style={{
        height,
        justifyContent: 'space-between',
        gap: space.xs,
        padding: space.xs,
        paddingHorizontal: space.s,
        borderRadius: radius.key,
        borderWidth: stroke.strong,
        borderStyle: 'dashed',
        borderColor: colors.brass,
        backgroundColor: colors.surface,
      }}
    >
      <View style={{ flexDirection: 'row', gap: space.s, alignItems: 'center' }}>
        <Icon name="attention" color="brass" size={28} />
        <AppText size={small} lineHeight={small + 1} weight="600" lines={3} style={{ flex: 1 }}>
          {doubt.sentence}
        </AppText>
      </View>
      <View style={{ flexDirection: 'row', gap: space.s }}>
        {doubt.answers.slice(0, 3).map((answer) => (
          <PressArea key={answer.id} isKey onPress={() => onAnswer(answer.id)} style={{ flex: 1 }}>
            {(isPressed) => (
              <View
                style={{
                  height: layout.control,
                  alignItems: 'center',
                  justifyContent: 'center',
                  borderRadius: radius.key,
                  borderWidth: stroke.line,
                  borderColor: colors.line,
                  backgroundColor: isPressed ? colors.pressed : colors.surface,
                }}
              >
                <AppText size={small} weight="800" align="center" lines={2}>
                  {answer.title}
                </AppText>
              </View>
            )}
          </PressArea>
        ))}
      </View>
    </View>
  );
}
