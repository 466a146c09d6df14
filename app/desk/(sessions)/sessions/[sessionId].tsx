import { useGlobalSearchParams, useLocalSearchParams, useRouter } from 'expo-router';
import { useIsWide } from '@/components/desk/DeskFrame';
import { SessionPane } from '@/components/desk/SessionPane';
import { neighboursOf, sessionHref, sessionsToShow, stateFilterOf } from '@/components/desk/sessionOrder';
import { useIsInside } from '@/stores/desk/useMay';
import { useSession, useSessions } from '@/stores/queries/deskQueries';

export default function SessionRoute() {
  const { sessionId } = useLocalSearchParams<{ sessionId: string }>();
  const params = useGlobalSearchParams<{ state?: string; find?: string }>();
  const router = useRouter();
  const isWide = useIsWide();
  const isInside = useIsInside();
  const filter = { state: stateFilterOf(params.state), text: params.find ?? '' };
  const { data, error, refetch } = useSession(sessionId);
  const sessions = useSessions();
  const shown = sessionsToShow(sessions.data?.sessions ?? [], filter);
  const { earlierId, laterId } = neighboursOf(shown, sessionId);
  const goTo = (id: string | null) => (id ? () => router.push(sessionHref(id, filter)) : null);
  if (!isInside) return null;
  return (
    <SessionPane
      key={sessionId}
      asked={{ data, error, onTryAgain: () => void refetch() }}
      onBack={isWide ? null : () => router.push(sessionHref(null, filter))}
      backHref={sessionHref(null, filter)}
      onEarlier={goTo(earlierId)}
      onLater={goTo(laterId)}
    />
  );
}
