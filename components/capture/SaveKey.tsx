import { BenchKey } from '@/components/keypad/BenchKey';
import { AppText } from '@/components/ui/AppText';
import { useTheme } from '@/components/ui/ThemeProvider';
import { isNextPressure, type KeypadEvent, type KeypadState } from '@/shared/entry/keypad';
import type { CaptureLayout } from './captureLayout';

/** The largest key. It says what it will do: SAVE, or on to the pressure when only the flow is there. */
export function SaveKey({
  layout,
  keypad,
  width,
  onEvent,
}: {
  layout: CaptureLayout;
  keypad: KeypadState;
  width: number;
  onEvent: (event: KeypadEvent) => void;
}) {
  const { colors } = useTheme();
  const isNext = isNextPressure(keypad);
  const small = layout.keyGap / 2;
  return (
    <BenchKey
      keypadKey="save"
      label={isNext ? 'On to the pressure' : 'SAVE'}
      shortcut="Enter"
      onEvent={onEvent}
      cell={{ width, height: layout.saveHeight, paddingHorizontal: small }}
      face={{
        backgroundColor: isNext ? colors.surface : colors.markingBlue,
        borderColor: colors.markingBlue,
        borderWidth: 3,
      }}
    >
      {(isPressed) => (
        <AppText
          size={isNext ? layout.size.save - 8 : layout.size.save}
          lineHeight={layout.size.save + 4}
          weight="800"
          color={isNext ? 'markingBlue' : 'onMarkingBlue'}
          style={{ letterSpacing: isNext ? 0 : 2, opacity: isPressed ? 0.8 : 1 }}
        >
          {isNext ? 'TO THE PRESSURE' : 'SAVE'}
        </AppText>
      )}
    </BenchKey>
  );
}
