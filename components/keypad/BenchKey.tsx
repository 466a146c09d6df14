import type { ReactNode } from 'react';
import { View, type StyleProp, type ViewStyle } from 'react-native';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, stroke } from '@/components/ui/tokens';
import type { KeypadEvent, KeypadKey } from '@/shared/entry/keypad';

export type BenchKeyProps = {
  keypadKey: KeypadKey;
  /** accessible name of a key without words */
  label?: string;
  onEvent: (event: KeypadEvent) => void;
  shortcut?: string;
  /** dead space is none: the cell is what is touched, the face what is seen */
  cell: StyleProp<ViewStyle>;
  face?: StyleProp<ViewStyle>;
  isSelected?: boolean;
  isDisabled?: boolean;
  children: ReactNode | ((isPressed: boolean) => ReactNode);
};

/** One key that speaks to the keypad reducer: goes down, comes up. */
export function BenchKey({ keypadKey, label, onEvent, cell, face, children, ...rest }: BenchKeyProps) {
  const { colors } = useTheme();
  return (
    <PressArea
      isKey
      label={label}
      isDisabled={rest.isDisabled}
      onDown={(atMs) => onEvent({ type: 'press', key: keypadKey, atMs })}
      onUp={(atMs, isInside) => onEvent({ type: 'release', key: keypadKey, atMs, isInside })}
      web={{ 'aria-pressed': rest.isSelected, 'aria-keyshortcuts': rest.shortcut }}
      style={cell}
    >
      {(isPressed) => (
        <View
          style={[
            {
              flex: 1,
              alignItems: 'center',
              justifyContent: 'center',
              borderRadius: radius.key,
              borderWidth: isPressed ? stroke.strong : stroke.line,
              borderColor: isPressed ? colors.markingBlue : colors.line,
              backgroundColor: isPressed ? colors.pressed : colors.surface,
            },
            face,
          ]}
        >
          {typeof children === 'function' ? children(isPressed) : children}
        </View>
      )}
    </PressArea>
  );
}
