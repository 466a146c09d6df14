import type { ReactNode } from 'react';
import { View } from 'react-native';
import { AppText } from './AppText';
import { Icon, type IconName } from './Icon';
import { useTheme } from './ThemeProvider';
import { radius, space, stroke, type Colors } from './tokens';

export type BannerKind = 'info' | 'attention' | 'refusal' | 'done';
const looks: Record<BannerKind, { icon: IconName; color: keyof Colors; word: string }> = {
  info: { icon: 'info', color: 'markingBlue', word: 'Note' },
  attention: { icon: 'attention', color: 'brass', word: 'Look here' },
  refusal: { icon: 'refusal', color: 'redOxide', word: 'Not done' },
  done: { icon: 'check', color: 'water', word: 'Done' },
};

/** A sentence that has to be seen: its kind is told by a shape and a word, not by colour alone. */
export function Banner({
  kind = 'info',
  word,
  sentence,
  children,
}: {
  kind?: BannerKind;
  /** the word in front, where the kind's own does not fit */
  word?: string;
  sentence: string;
  /** what can be pressed about it */
  children?: ReactNode;
}) {
  const { colors, place } = useTheme();
  const look = looks[kind];
  return (
    <View
      role={kind === 'refusal' ? 'alert' : 'status'}
      style={{
        flexDirection: 'row',
        gap: space.m,
        padding: space.m,
        borderRadius: radius.card,
        borderWidth: stroke.line,
        borderLeftWidth: 8,
        borderColor: colors[look.color],
        backgroundColor: colors.surface,
      }}
    >
      <Icon name={look.icon} color={look.color} size={place === 'bench' ? 28 : 24} />
      <View style={{ flex: 1, gap: space.s }}>
        <AppText>
          <AppText weight="800" color={look.color}>
            {word ?? look.word}
            {'. '}
          </AppText>
          {sentence}
        </AppText>
        {children}
      </View>
    </View>
  );
}
