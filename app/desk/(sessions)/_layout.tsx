import { Slot, useGlobalSearchParams, useRouter } from 'expo-router';
import { useEffect, useMemo, useState } from 'react';
import { useIsWide } from '@/components/desk/DeskFrame';
import { ListBeside } from '@/components/desk/ListBeside';
import { SessionList } from '@/components/desk/SessionList';
import { neighboursOf, sessionHref, sessionsToShow, stateFilterOf } from '@/components/desk/sessionOrder';
import { useDeskKeys } from '@/components/desk/useDeskKeys';
import { Screen } from '@/components/ui/Screen';
import { usePreferencesStore } from '@/stores/desk/preferencesStore';
import { useIsInside, useMay } from '@/stores/desk/useMay';
import { useSessions } from '@/stores/queries/deskQueries';

export default function SessionsLayout() {
  return useIsInside() ? <Panes /> : <Slot />;
}

/** List and session side by side, or one of them at a time. The address is the selection and the filter. */
function Panes() {
  const isWide = useIsWide();
  const router = useRouter();
  const { sessionId = null, ...params } = useGlobalSearchParams<{
    sessionId?: string;
    state?: string;
    find?: string;
  }>();
  const [filter, setFilter] = useState({ state: stateFilterOf(params.state), text: params.find ?? '' });
  const sessions = useSessions();
  const mayPlan = useMay('planSession');
  const hasKeys = usePreferencesStore((state) => state.hasKeys);

  // the address follows what is typed a moment later; an address that came from elsewhere is taken over
  useEffect(() => {
    const timer = setTimeout(() => {
      const { state, text } = filter;
      router.setParams({ state: state === 'all' ? undefined : state, find: text.trim() || undefined });
    }, 300);
    return () => clearTimeout(timer);
  }, [filter, sessionId, router]);

  const keys = useMemo(() => {
    const shown = sessionsToShow(sessions.data?.sessions ?? [], filter);
    const { earlierId, laterId } = neighboursOf(shown, sessionId);
    const goTo = (id: string | null) => (hasKeys && id ? () => router.push(sessionHref(id, filter)) : null);
    const find = () => document.querySelector<HTMLElement>('[data-find] input')?.focus();
    return { j: goTo(laterId), k: goTo(earlierId), '/': hasKeys ? find : null };
  }, [sessions.data, filter, sessionId, hasKeys, router]);
  useDeskKeys(keys);

  const list = (
    <SessionList
      asked={{
        data: sessions.data?.sessions,
        error: sessions.error,
        onTryAgain: () => void sessions.refetch(),
      }}
      filter={filter}
      onFilter={setFilter}
      selectedId={sessionId}
      hrefOf={(id) => sessionHref(id, filter)}
      onGo={(href) => router.push(href)}
      onPlan={mayPlan ? () => router.push('/desk/sessions/plan') : null}
    />
  );
  if (isWide)
    return (
      <ListBeside label="Sessions" list={list}>
        <Slot />
      </ListBeside>
    );
  return sessionId ? <Slot /> : <Screen title="Sessions">{list}</Screen>;
}
