import { View } from 'react-native';
import { ColumnMini } from '@/components/column/ColumnMini';
import { AppText } from '@/components/ui/AppText';
import { Icon } from '@/components/ui/Icon';
import { Stack } from '@/components/ui/Layout';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';
import type { RunView, SessionView } from '@/shared/schema/views';
import { benchColumn } from './benchColumn';
import { openLifts } from './readingRows';
import { runTitle } from './words';

/** One run in a session: press it to key on. */
export function BenchRunLine({
  run,
  view,
  href,
  onOpen,
}: {
  run: RunView;
  view: SessionView;
  href: string;
  onOpen: () => void;
}) {
  const { colors } = useTheme();
  const { toDo, skipped } = openLifts(run);
  const doneCount = run.rungs.length - toDo.length - skipped.length;
  const words =
    toDo.length === 0
      ? `finished: ${run.readings.length} readings${skipped.length > 0 ? `, ${skipped.length} skipped` : ''}`
      : `${doneCount} of ${run.rungs.length} lifts, next ${toDo[0]}`;
  return (
    <PressArea onPress={onOpen} href={href}>
      {(isPressed) => (
        <View
          style={{
            minHeight: 80,
            flexDirection: 'row',
            alignItems: 'center',
            gap: space.m,
            padding: space.l,
            borderRadius: radius.card,
            borderWidth: stroke.line,
            borderColor: colors.line,
            backgroundColor: isPressed ? colors.pressed : colors.surface,
          }}
        >
          <Stack gap="s" style={{ flex: 1, minWidth: 0 }}>
            <AppText variant="heading">{runTitle(run.run)}</AppText>
            <ColumnMini rungs={benchColumn(run, view)} width={240} />
            <AppText color="quietInk">{words}</AppText>
          </Stack>
          <Icon name="forward" color="markingBlue" />
        </View>
      )}
    </PressArea>
  );
}
