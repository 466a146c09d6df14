import { useMemo } from 'react';
import { ColumnMini } from '@/components/column/ColumnMini';
import { AppText } from '@/components/ui/AppText';
import { Row, Stack } from '@/components/ui/Layout';
import type { RunView, SessionView } from '@/shared/schema/views';
import { columnOf, openLifts, readingRows, type RunTableRow } from './readingRows';
import { ReadingTable } from './ReadingTable';
import { runTitle } from './words';

type Props = {
  view: RunView;
  session: SessionView;
  newIds: ReadonlySet<string>;
  onOpen: (row: RunTableRow) => void;
};

/** One run: its column laid small, its table, and the lifts that are still open. */
export function RunSection({ view, session, newIds, onOpen }: Props) {
  const rows = useMemo(() => readingRows(view, session), [view, session]);
  const { toDo, skipped } = openLifts(view);
  const title = runTitle(view.run);
  const keyedCount = view.rungs.length - toDo.length - skipped.length;
  return (
    <Stack gap="s">
      <Row gap="m" justify="space-between">
        <Stack gap="hair" style={{ flexShrink: 1 }}>
          <AppText variant="heading" level={2}>{`Run ${view.run.runOrdinal}: ${title}`}</AppText>
          <AppText variant="small" color="quietInk">
            {view.rungs.length > 0
              ? `${keyedCount} of ${view.rungs.length} planned lifts, ${rows.length} readings`
              : `${rows.length} readings, no lift plan`}
          </AppText>
        </Stack>
        {view.rungs.length > 0 ? <ColumnMini rungs={columnOf(view, rows)} /> : null}
      </Row>
      {rows.length > 0 ? (
        <ReadingTable label={`Readings of ${title}`} rows={rows} newIds={newIds} onOpen={onOpen} />
      ) : (
        <AppText color="quietInk">No reading yet. It shows here as soon as the bench sends one.</AppText>
      )}
      {rows.length > 0 && toDo.length > 0 ? (
        <AppText variant="small" color="quietInk">{`Not keyed yet: ${toDo.join(', ')}`}</AppText>
      ) : null}
      {skipped.length > 0 ? (
        <AppText variant="small" color="quietInk">{`Skipped: ${skipped.join(', ')}`}</AppText>
      ) : null}
    </Stack>
  );
}
