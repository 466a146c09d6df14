import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space, stroke } from '@/components/ui/tokens';

/** A newer version of the app is on this device and waits to be taken. */
export function UpdateOffer({ onTake }: { onTake: () => void }) {
  const { colors } = useTheme();
  return (
    <View
      role="status"
      style={{
        flexDirection: 'row',
        flexWrap: 'wrap',
        alignItems: 'center',
        justifyContent: 'space-between',
        gap: space.s,
        paddingHorizontal: space.l,
        paddingVertical: space.s,
        borderTopWidth: stroke.line,
        borderTopColor: colors.line,
        backgroundColor: colors.surface,
      }}
    >
      <AppText style={{ flexShrink: 1 }}>A new version is ready. Nothing that is saved changes.</AppText>
      <Button title="Use the new version" onPress={onTake} />
    </View>
  );
}
