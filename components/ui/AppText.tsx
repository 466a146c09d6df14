import type { ReactNode } from 'react';
import { Text, type StyleProp, type TextStyle } from 'react-native';
import { useTheme } from './ThemeProvider';
import {
  fontFamilies,
  lineHeightRatio,
  textSizes,
  type Colors,
  type FontWeight,
  type TextVariant,
} from './tokens';
import { webProps } from './webProps';

const weightOf: Record<TextVariant, FontWeight> = {
  display: '800',
  title: '800',
  heading: '600',
  body: '400',
  label: '600',
  small: '400',
  data: '600',
};

export type AppTextProps = {
  variant?: TextVariant;
  /** a colour role; quiet things are quietInk */
  color?: keyof Colors;
  weight?: FontWeight;
  /** px, where a layout works sizes out; otherwise the variant's */
  size?: number;
  lineHeight?: number;
  align?: 'left' | 'center' | 'right';
  lines?: number;
  /** makes it a heading of this level */
  level?: 1 | 2 | 3;
  /** spoken when it changes */
  isLive?: boolean;
  isSelectable?: boolean;
  id?: string;
  label?: string;
  isHidden?: boolean;
  style?: StyleProp<TextStyle>;
  children: ReactNode;
};

/** All text of the app. */
export function AppText(props: AppTextProps) {
  const { variant = 'body', color = 'ink', align, lines, level, style, children } = props;
  const { colors, place, isTablet } = useTheme();
  const size = props.size ?? Math.round(textSizes[place][variant] * (isTablet ? 1.1 : 1));
  return (
    <Text
      id={props.id}
      role={level ? 'heading' : props.isLive ? 'status' : undefined}
      aria-label={props.label}
      aria-hidden={props.isHidden}
      aria-live={props.isLive ? 'polite' : undefined}
      numberOfLines={lines}
      selectable={props.isSelectable}
      {...(level ? webProps({ 'aria-level': level }) : {})}
      style={[
        {
          color: colors[color],
          fontFamily: fontFamilies[props.weight ?? weightOf[variant]],
          fontSize: size,
          lineHeight: props.lineHeight ?? Math.round(size * lineHeightRatio[variant]),
          textAlign: align,
        },
        style,
      ]}
    >
      {children}
    </Text>
  );
}
