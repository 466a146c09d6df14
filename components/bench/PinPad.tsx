import { useEffect, useRef } from 'react';
import { View, useWindowDimensions } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Icon } from '@/components/ui/Icon';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, stroke } from '@/components/ui/tokens';

export const pinLength = 6;
const rows = [
  ['1', '2', '3'],
  ['4', '5', '6'],
  ['7', '8', '9'],
  ['clear', '0', 'backspace'],
] as const;
type PinKey = (typeof rows)[number][number];
const names: Partial<Record<PinKey, string>> = { clear: 'Clear', backspace: 'Backspace' };

/** Six digits with big keys; they act when they go down, and a hardware keyboard works too. */
export function PinPad({
  pin,
  onChange,
  isDisabled,
}: {
  pin: string;
  onChange: (pin: string) => void;
  isDisabled: boolean;
}) {
  const { isTablet } = useTheme();
  const { height } = useWindowDimensions();
  // the pad fits a phone's browser tab with names and dots above it
  const keyHeight = isTablet ? 112 : height < 740 ? 72 : 84;
  const take = (key: PinKey) => onChange(pinAfter(pin, key));
  useHardwareDigits(take, !isDisabled);
  return (
    <View role="group" aria-label="PIN pad" style={{ width: '100%', maxWidth: isTablet ? 480 : 400 }}>
      {rows.map((row) => (
        <View key={row.join()} style={{ flexDirection: 'row' }}>
          {row.map((key) => (
            <PressArea
              key={key}
              isKey
              isDisabled={isDisabled}
              label={names[key] ?? key}
              onDown={() => take(key)}
              style={{ flex: 1, flexBasis: 0, height: keyHeight + 8, padding: 4 }}
            >
              {(isPressed) => <KeyFace pinKey={key} isPressed={isPressed} isDisabled={isDisabled} />}
            </PressArea>
          ))}
        </View>
      ))}
    </View>
  );
}

function KeyFace(props: { pinKey: PinKey; isPressed: boolean; isDisabled: boolean }) {
  const { pinKey, isPressed, isDisabled } = props;
  const { colors } = useTheme();
  const ink = isDisabled ? 'quietInk' : 'ink';
  return (
    <View
      style={{
        flex: 1,
        alignItems: 'center',
        justifyContent: 'center',
        borderRadius: radius.key,
        borderWidth: isPressed ? stroke.strong : stroke.line,
        borderStyle: isDisabled ? 'dashed' : 'solid',
        borderColor: isPressed ? colors.markingBlue : colors.line,
        backgroundColor: isPressed ? colors.pressed : colors.surface,
      }}
    >
      {pinKey === 'backspace' ? (
        <Icon name="backspace" size={36} color={ink} />
      ) : (
        <AppText size={pinKey === 'clear' ? 22 : 40} weight="600" color={ink}>
          {pinKey}
        </AppText>
      )}
    </View>
  );
}

/** How many digits are keyed, as filled squares; the digits themselves are never shown. */
export function PinDots({ count }: { count: number }) {
  const { colors } = useTheme();
  return (
    <View
      role="img"
      aria-label={`${count} of ${pinLength} digits keyed`}
      style={{ flexDirection: 'row', gap: 14, height: 24, alignItems: 'center' }}
    >
      {Array.from({ length: pinLength }, (_, at) => (
        <View
          key={at}
          style={{
            width: 20,
            height: 20,
            borderRadius: 4,
            borderWidth: stroke.strong,
            borderColor: at < count ? colors.ink : colors.line,
            backgroundColor: at < count ? colors.ink : 'transparent',
          }}
        />
      ))}
    </View>
  );
}

function pinAfter(pin: string, key: PinKey): string {
  if (key === 'clear') return '';
  if (key === 'backspace') return pin.slice(0, -1);
  return pin.length < pinLength ? pin + key : pin;
}

function useHardwareDigits(take: (key: PinKey) => void, isOn: boolean): void {
  const latest = useRef(take);
  useEffect(() => {
    latest.current = take;
  }, [take]);
  useEffect(() => {
    if (!isOn) return;
    const onKey = (event: KeyboardEvent) => {
      if (event.repeat || event.ctrlKey || event.metaKey || event.altKey) return;
      const key = /^\d$/.test(event.key)
        ? (event.key as PinKey)
        : event.key === 'Backspace'
          ? 'backspace'
          : null;
      if (key === null) return;
      event.preventDefault();
      latest.current(key);
    };
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  }, [isOn]);
}
