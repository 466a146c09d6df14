import { useRouter } from 'expo-router';
import { BenchSessionLine } from '@/components/session/BenchSessionLine';
import { groupSessions } from '@/components/session/benchSessionOrder';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Row, Stack } from '@/components/ui/Layout';
import { Screen } from '@/components/ui/Screen';
import { EmptyState, ErrorState, Progress } from '@/components/ui/States';
import type { SessionSummary } from '@/shared/schema/views';
import { useBenchSession, useBenchSessions } from '@/stores/queries/benchQueries';

export default function BenchSessionsRoute() {
  const router = useRouter();
  const { data: sessions, error, refetch } = useBenchSessions();
  const start = () => router.push('/bench/sessions/new');
  return (
    <Screen title="Sessions">
      {error ? (
        <ErrorState
          sentence="The sessions on this device could not be read."
          details={String(error)}
          onTryAgain={() => void refetch()}
        />
      ) : null}
      {!sessions && !error ? <Progress label="Reading the sessions on this device" /> : null}
      {sessions && sessions.length > 0 ? (
        <Button title="Start a session" kind="primary" icon="add" isWide onPress={start} />
      ) : null}
      {sessions?.length === 0 ? (
        <EmptyState
          title="No session yet"
          sentence="Sessions that the supervisor plans come here by themselves. You can also start one."
          actionTitle="Start a session"
          onAction={start}
        />
      ) : null}
      {groupSessions(sessions ?? []).map((group) => (
        <Stack key={group.title} gap="m">
          <AppText variant="heading" level={2}>
            {group.title}
          </AppText>
          {group.sessions.map((session) => (
            <SessionLine key={session.id} summary={session} />
          ))}
        </Stack>
      ))}
      <Row gap="m">
        <Button
          title="This device"
          icon="more"
          href="/bench/device"
          onPress={() => router.push('/bench/device')}
        />
      </Row>
    </Screen>
  );
}

function SessionLine({ summary }: { summary: SessionSummary }) {
  const router = useRouter();
  const { data: view } = useBenchSession(summary.id);
  const href = `/bench/sessions/${summary.id}`;
  return (
    <BenchSessionLine
      summary={summary}
      view={view ?? null}
      href={href}
      onOpen={() => router.push(`/bench/sessions/${summary.id}`)}
    />
  );
}
