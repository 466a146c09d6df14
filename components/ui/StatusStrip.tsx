import { View, useWindowDimensions } from 'react-native';
import { AppText } from './AppText';
import { Icon } from './Icon';
import { PressArea } from './PressArea';
import { Spoken } from './Spoken';
import { useTheme } from './ThemeProvider';
import { space, stroke } from './tokens';

export type StatusFacts = {
  /** who is keying: a name */
  who: string;
  /** where the readings are: "14 saved on this device", "all sent 10:42" */
  where: string;
  /** the same in fewer letters, for a narrow screen: "14 on device" */
  whereShort?: string;
  /** the oldest unsent one is over a day old; `where` then says its age */
  isOld?: boolean;
  /** how many things wait for a person */
  needsPersonCount: number;
};

/** Three facts, always in the same place: who, where the readings are, what needs a person. Press it for the list. */
export function StatusStrip({
  facts,
  height = 40,
  onPress,
}: {
  facts: StatusFacts;
  height?: number;
  onPress: () => void;
}) {
  const { colors, place, isTablet } = useTheme();
  const size = place === 'desk' ? 15 : isTablet ? 22 : 20;
  const { who, where, isOld = false, needsPersonCount: count } = facts;
  const { width } = useWindowDimensions();
  // letters that fit beside the name, the mark of age and the count
  const room = (width - 2 * space.s - (count > 0 ? size * 3 : 0) - (isOld ? size + 4 : 0)) / (size * 0.6);
  const shown = who.length + 1 + where.length > room ? (facts.whereShort ?? where) : where;
  return (
    <PressArea onPress={onPress} web={{ dataSet: { print: 'no' } }} style={{ alignSelf: 'stretch' }}>
      {(isPressed) => (
        <View
          style={{
            height,
            flexDirection: 'row',
            alignItems: 'center',
            gap: space.m,
            paddingHorizontal: space.s,
            backgroundColor: isPressed ? colors.pressed : colors.surface,
            borderBottomWidth: stroke.line,
            borderBottomColor: colors.line,
          }}
        >
          <AppText size={size} weight="800" lines={1} style={{ flexShrink: 4 }}>
            {who}
          </AppText>
          <View
            style={{ flexGrow: 1, flexShrink: 1, flexDirection: 'row', gap: space.xs, alignItems: 'center' }}
          >
            {isOld ? <Icon name="attention" color="brass" size={size} /> : null}
            <AppText
              size={size}
              weight={isOld ? '800' : '400'}
              color={isOld ? 'brass' : 'quietInk'}
              lines={1}
              style={{ flexShrink: 1 }}
            >
              {shown}
            </AppText>
          </View>
          {count > 0 ? (
            <View style={{ flexDirection: 'row', gap: space.xs, alignItems: 'center' }}>
              <Icon name="attention" color="redOxide" size={size + 2} />
              <AppText size={size} weight="800" color="redOxide">
                {isTablet || place === 'desk' ? `${count} need you` : count}
              </AppText>
            </View>
          ) : null}
          <Spoken>
            {count === 0 ? 'Nothing needs a person.' : 'need a person.'} Open the list of what is not sent
          </Spoken>
        </View>
      )}
    </PressArea>
  );
}
