import type { ReactNode } from 'react';
import { View, type StyleProp, type ViewStyle } from 'react-native';
import { useTheme } from './ThemeProvider';
import { radius, space, stroke } from './tokens';

type BoxProps = {
  gap?: keyof typeof space;
  align?: ViewStyle['alignItems'];
  justify?: ViewStyle['justifyContent'];
  style?: StyleProp<ViewStyle>;
  children: ReactNode;
};

/** Things under each other. */
export function Stack({ gap = 'l', align, justify, style, children }: BoxProps) {
  return (
    <View style={[{ gap: space[gap], alignItems: align, justifyContent: justify }, style]}>{children}</View>
  );
}

/** Things beside each other; they wrap unless told not to. */
export function Row({
  gap = 's',
  align = 'center',
  justify,
  isWrapping = true,
  style,
  children,
}: BoxProps & { isWrapping?: boolean }) {
  return (
    <View
      style={[
        {
          flexDirection: 'row',
          flexWrap: isWrapping ? 'wrap' : 'nowrap',
          gap: space[gap],
          alignItems: align,
          justifyContent: justify,
        },
        style,
      ]}
    >
      {children}
    </View>
  );
}

/** A sheet of surface with a border; `label` makes it a named region. */
export function Card({
  label,
  gap = 'm',
  style,
  children,
}: {
  label?: string;
  gap?: keyof typeof space;
  style?: StyleProp<ViewStyle>;
  children: ReactNode;
}) {
  const { colors } = useTheme();
  return (
    <View
      role={label ? 'region' : undefined}
      aria-label={label}
      style={[
        {
          backgroundColor: colors.surface,
          borderColor: colors.line,
          borderWidth: stroke.line,
          borderRadius: radius.card,
          padding: space.l,
          gap: space[gap],
        },
        style,
      ]}
    >
      {children}
    </View>
  );
}
