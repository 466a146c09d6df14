import { View } from 'react-native';
import { ColumnMini } from '@/components/column/ColumnMini';
import { AppText } from '@/components/ui/AppText';
import { Icon } from '@/components/ui/Icon';
import { Row, Stack } from '@/components/ui/Layout';
import { PressArea } from '@/components/ui/PressArea';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';
import type { RunView, SessionSummary, SessionView } from '@/shared/schema/views';
import { StateWord } from './StateWord';
import { benchColumn } from './benchColumn';
import { stateWord } from './words';

/** One session in the bench's list: whose head, how far, and a small column for each run. */
export function BenchSessionLine({
  summary,
  view,
  href,
  onOpen,
}: {
  summary: SessionSummary;
  /** null while it is read: the columns then follow */
  view: SessionView | null;
  href: string;
  onOpen: () => void;
}) {
  const { colors } = useTheme();
  const word = stateWord(summary);
  return (
    <PressArea onPress={onOpen} href={href}>
      {(isPressed) => (
        <View
          style={{
            flexDirection: 'row',
            gap: space.m,
            padding: space.l,
            borderRadius: radius.card,
            borderWidth: stroke.line,
            borderColor: colors.line,
            backgroundColor: isPressed ? colors.pressed : colors.surface,
          }}
        >
          <Stack gap="s" style={{ flex: 1, minWidth: 0 }}>
            <Row gap="m" justify="space-between">
              <AppText variant="heading" weight="800">
                {summary.label}
              </AppText>
              <StateWord word={word} />
            </Row>
            <View>
              <AppText weight="600">{summary.headName}</AppText>
              <AppText>{`${summary.customerName} · ${summary.stageName}`}</AppText>
            </View>
            {view && view.runs.length > 0 ? (
              <Row gap="m">
                {view.runs.map((run) => (
                  <RunColumn key={run.run.id} run={run} view={view} />
                ))}
              </Row>
            ) : null}
            <AppText color="quietInk">{countWords(summary)}</AppText>
          </Stack>
          <View style={{ justifyContent: 'center' }}>
            <Icon name="forward" color="markingBlue" />
          </View>
        </View>
      )}
    </PressArea>
  );
}

function RunColumn({ run, view }: { run: RunView; view: SessionView }) {
  return (
    <Row gap="xs" isWrapping={false}>
      <AppText variant="small">{`${run.run.side === 'intake' ? 'In' : 'Ex'} ${run.run.port}`}</AppText>
      <ColumnMini rungs={benchColumn(run, view)} />
    </Row>
  );
}

function countWords(summary: SessionSummary): string {
  if (summary.runCount === 0) return 'No run yet';
  const runs = summary.runCount === 1 ? '1 run' : `${summary.runCount} runs`;
  const readings = summary.readingCount === 1 ? '1 reading' : `${summary.readingCount} readings`;
  const waiting = summary.notSentCount > 0 ? `, ${summary.notSentCount} not sent` : '';
  return `${runs}, ${readings}${waiting}`;
}
