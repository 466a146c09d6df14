import type { ColumnRung } from '@/components/column/rungState';
import type { RunView, SessionView } from '@/shared/schema/views';
import { rungsByLift } from '@/shared/session/nextRung';
import { columnOf, readingRows } from './readingRows';

/** A run's rungs as its column draws them: lowest lift first. */
export function benchColumn(run: RunView, view: SessionView): ColumnRung[] {
  return columnOf({ ...run, rungs: rungsByLift(run.rungs) }, readingRows(run, view));
}
