import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space, stroke } from '@/components/ui/tokens';

/** A few words of which one holds, in little room. */
export function FilterChips({
  label,
  options,
  value,
  onChange,
}: {
  label: string;
  options: readonly string[];
  value: string;
  onChange: (value: string) => void;
}) {
  const { colors } = useTheme();
  return (
    <View role="group" aria-label={label} style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.s }}>
      {options.map((option) => {
        const isChosen = option === value;
        return (
          <PressArea key={option} onPress={() => onChange(option)} web={{ 'aria-pressed': isChosen }}>
            <View
              style={{
                minHeight: 36,
                justifyContent: 'center',
                paddingHorizontal: space.m,
                borderRadius: 18,
                borderWidth: isChosen ? stroke.strong : stroke.line,
                borderColor: isChosen ? colors.markingBlue : colors.line,
                backgroundColor: isChosen ? colors.pressed : colors.surface,
              }}
            >
              <AppText variant="small" weight={isChosen ? '800' : '400'}>
                {option}
              </AppText>
            </View>
          </PressArea>
        );
      })}
    </View>
  );
}
