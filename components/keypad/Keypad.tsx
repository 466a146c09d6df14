import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Icon } from '@/components/ui/Icon';
import type { KeypadEvent, KeypadKey } from '@/shared/entry/keypad';
import type { DecimalMark } from '@/shared/schema/primitives';
import { BenchKey } from './BenchKey';

export type KeypadProps = {
  mark: DecimalMark;
  /** height of a key's face, px */
  keyHeight: number;
  /** seen between faces; touch cells meet in its middle */
  gap: number;
  labelSize: number;
  /** whole width including half a gap at either side */
  width: number;
  onEvent: (event: KeypadEvent) => void;
};

const rows: KeypadKey[][] = [
  ['1', '2', '3'],
  ['4', '5', '6'],
  ['7', '8', '9'],
  ['mark', '0', 'backspace'],
];

/** The pad: 1-2-3 on top, zero bottom centre, the shop's mark at its left, backspace at its right. */
export function Keypad({ mark, keyHeight, gap, labelSize, width, onEvent }: KeypadProps) {
  const names: Partial<Record<KeypadKey, string>> = {
    mark: mark === ',' ? 'Decimal comma' : 'Decimal point',
    backspace: 'Backspace',
  };
  const half = gap / 2;
  return (
    <View role="group" aria-label="Number pad" style={{ width }}>
      {rows.map((row, at) => (
        <View key={row.join()} style={{ flexDirection: 'row' }}>
          {row.map((key) => (
            <BenchKey
              key={key}
              keypadKey={key}
              label={names[key] ?? key}
              onEvent={onEvent}
              cell={{
                flex: 1,
                flexBasis: 0,
                height: keyHeight + (at === 0 ? half : gap),
                paddingTop: at === 0 ? 0 : half,
                paddingBottom: half,
                paddingHorizontal: half,
              }}
            >
              {key === 'backspace' ? (
                <Icon name="backspace" size={labelSize} />
              ) : (
                <AppText size={labelSize} weight="600" lineHeight={labelSize * 1.1}>
                  {key === 'mark' ? mark : key}
                </AppText>
              )}
            </BenchKey>
          ))}
        </View>
      ))}
    </View>
  );
}
