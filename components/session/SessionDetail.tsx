import { useMemo, useState } from 'react';
import { AppText } from '@/components/ui/AppText';
import { Stack } from '@/components/ui/Layout';
import { EmptyState } from '@/components/ui/States';
import type { SessionView } from '@/shared/schema/views';
import { ReadingSheet } from './ReadingSheet';
import type { RunTableRow } from './readingRows';
import { RunSection } from './RunSection';
import { SessionHead } from './SessionHead';
import { useNewIds } from './useNewIds';

/** One session with its runs. Where the view came from is nobody's business here. */
export function SessionDetail({ view }: { view: SessionView }) {
  const ids = useMemo(
    () => view.runs.flatMap((run) => run.readings.map((reading) => reading.id)),
    [view.runs],
  );
  const newIds = useNewIds(ids);
  const [opened, setOpened] = useState<RunTableRow | null>(null);
  return (
    <Stack gap="xl">
      <SessionHead view={view} />
      <AppText variant="small" isLive isHidden={newIds.size === 0} style={newIds.size === 0 ? hidden : {}}>
        {newIds.size === 0 ? '' : newIds.size === 1 ? '1 new reading' : `${newIds.size} new readings`}
      </AppText>
      {view.runs.length === 0 ? (
        <EmptyState
          title="No run yet"
          sentence="The session waits at the bench. Runs and readings show here as they are keyed."
        />
      ) : (
        view.runs.map((run) => (
          <RunSection key={run.run.id} view={run} session={view} newIds={newIds} onOpen={setOpened} />
        ))
      )}
      {opened ? <ReadingSheet row={opened} onClose={() => setOpened(null)} /> : null}
    </Stack>
  );
}

const hidden = { height: 0 } as const;
