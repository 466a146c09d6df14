import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { useTheme } from '@/components/ui/ThemeProvider';
import { stroke, type Colors } from '@/components/ui/tokens';

const inks: Record<string, keyof Colors> = {
  planned: 'quietInk',
  open: 'water',
  'handed in': 'markingBlue',
  returned: 'brass',
  approved: 'ink',
};

/** A session's state in a frame: dashed while planned, double when approved. */
export function StateWord({ word }: { word: string }) {
  const { colors } = useTheme();
  const ink = inks[word] ?? 'ink';
  return (
    <View
      style={{
        paddingHorizontal: 8,
        paddingVertical: 1,
        borderRadius: 4,
        borderWidth: word === 'handed in' || word === 'returned' ? stroke.strong : stroke.line,
        borderStyle: word === 'planned' ? 'dashed' : 'solid',
        borderColor: colors[ink],
      }}
    >
      <AppText variant="small" weight="600" color={ink}>
        {word}
      </AppText>
    </View>
  );
}
