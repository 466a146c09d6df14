import type { ReactNode } from 'react';
import { ScrollView, View } from 'react-native';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space, stroke } from '@/components/ui/tokens';

/** Two panes: a list that keeps its place, and what is chosen in it. */
export function ListBeside({
  label,
  list,
  children,
}: {
  label: string;
  list: ReactNode;
  children: ReactNode;
}) {
  const { colors } = useTheme();
  return (
    <View style={{ flex: 1, flexDirection: 'row', minHeight: 0 }}>
      <View
        role="complementary"
        aria-label={label}
        style={{ width: 352, borderRightWidth: stroke.line, borderColor: colors.line }}
      >
        <ScrollView contentContainerStyle={{ padding: space.l }}>{list}</ScrollView>
      </View>
      <View style={{ flex: 1, minWidth: 0 }}>{children}</View>
    </View>
  );
}
