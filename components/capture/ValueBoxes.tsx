import { View } from 'react-native';
import { BenchKey } from '@/components/keypad/BenchKey';
import { AppText } from '@/components/ui/AppText';
import { Spoken } from '@/components/ui/Spoken';
import { useTheme } from '@/components/ui/ThemeProvider';
import { glyphAdvanceEm, space, stroke } from '@/components/ui/tokens';
import type { KeypadEvent, KeypadState, Lane } from '@/shared/entry/keypad';
import type { CaptureLayout } from './captureLayout';
import { unitLabel } from './captureProps';

/** Line height of a lone number: digits have nothing below the line. */
const digitHeight = 0.88;

/** Flow and test pressure: the one being keyed is large, the other waits beside it; "same" takes the last pressure. */
export function ValueBoxes({
  layout,
  keypad,
  flowUnit,
  pressureUnit,
  onEvent,
}: {
  layout: CaptureLayout;
  keypad: KeypadState;
  flowUnit: string;
  pressureUnit: string;
  onEvent: (event: KeypadEvent) => void;
}) {
  const { control, contentWidth, valuesHeight } = layout;
  const gap = space.xs;
  const isStacked = layout.arrangement === 'tabletSide';
  const same = control;
  const waiting = control === 64 ? 88 : 112;
  const active = isStacked ? contentWidth : contentWidth - same - waiting - 2 * gap;
  const box = (lane: Lane) => {
    const isActive = keypad.lane === lane;
    const width = isStacked
      ? lane === 'flow'
        ? contentWidth
        : contentWidth - same - gap
      : isActive
        ? active
        : waiting;
    return (
      <ValueBox
        lane={lane}
        text={lane === 'flow' ? keypad.flowText : keypad.pressureText}
        unit={unitLabel(lane === 'flow' ? flowUnit : pressureUnit)}
        isActive={isActive}
        isRepeated={lane === 'pressure' && keypad.isPressureRepeated}
        width={width}
        height={valuesHeight}
        size={isActive || isStacked ? layout.size.value : layout.size.value / 2}
        small={layout.size.small}
        onEvent={onEvent}
      />
    );
  };
  const sameKey = (
    <BenchKey
      keypadKey="same"
      onEvent={onEvent}
      cell={{ width: same, height: valuesHeight, paddingVertical: space.hair }}
    >
      <AppText size={layout.size.small} lineHeight={layout.size.small + 4} weight="600">
        same
      </AppText>
      <AppText
        size={Math.min(layout.size.small, 64 / (0.62 * (keypad.lastPressureText?.length ?? 1)))}
        color="quietInk"
        lines={1}
      >
        {keypad.lastPressureText ?? '–'}
      </AppText>
      <Spoken>pressure as before</Spoken>
    </BenchKey>
  );
  if (isStacked) {
    return (
      <View style={{ gap }}>
        {box('flow')}
        <View style={{ flexDirection: 'row', gap }}>
          {box('pressure')}
          {sameKey}
        </View>
      </View>
    );
  }
  return (
    <View style={{ flexDirection: 'row', gap, height: valuesHeight }}>
      {box('flow')}
      {box('pressure')}
      {sameKey}
    </View>
  );
}

function ValueBox({
  lane,
  text,
  unit,
  isActive,
  isRepeated,
  width,
  height,
  size,
  small,
  onEvent,
}: {
  lane: Lane;
  text: string;
  unit: string;
  isActive: boolean;
  isRepeated: boolean;
  width: number;
  height: number;
  size: number;
  small: number;
  onEvent: (event: KeypadEvent) => void;
}) {
  const { colors } = useTheme();
  const room = width - 2 * space.s - (isActive ? 6 : 0);
  const fitting = Math.floor(
    Math.min(size, room / (glyphAdvanceEm * Math.max(1, text.length)), (height - small - 10) / digitHeight),
  );
  const isWide = width > 180;
  return (
    <BenchKey
      keypadKey={lane}
      onEvent={onEvent}
      isSelected={isActive}
      cell={{ width, height, paddingVertical: space.hair }}
      face={{
        alignItems: 'stretch',
        justifyContent: 'space-between',
        paddingHorizontal: space.s - 2,
        paddingTop: 1,
        paddingBottom: 2,
        borderWidth: isActive ? stroke.focus : stroke.line,
        borderColor: isActive ? colors.markingBlue : colors.line,
      }}
    >
      {isWide ? null : <Spoken>{lane}</Spoken>}
      <AppText
        size={small}
        lineHeight={small + 3}
        lines={1}
        weight={isActive ? '800' : '400'}
        color={isActive ? 'markingBlue' : 'quietInk'}
      >
        {isWide ? `${lane} ${unit}` : unit}
        {isRepeated && isWide ? ' same' : ''}
      </AppText>
      <View
        style={{ flexDirection: 'row', alignItems: 'center', justifyContent: 'flex-end', flex: 1, gap: 2 }}
      >
        <AppText
          size={fitting}
          lineHeight={Math.round(fitting * digitHeight)}
          weight={isActive ? '800' : '600'}
          lines={1}
        >
          {text}
        </AppText>
        {isActive ? (
          <View
            style={{
              width: 4,
              height: Math.min(size * 0.75, height - small - 16),
              backgroundColor: colors.markingBlue,
            }}
          />
        ) : null}
      </View>
      {text === '' ? <Spoken>empty</Spoken> : null}
      {isRepeated && !isWide ? <Spoken>same as before</Spoken> : null}
    </BenchKey>
  );
}
