import { useQuery, type UseQueryResult } from '@tanstack/react-query';
import type { Role } from '@/shared/schema/primitives';
import { Role as RoleShape } from '@/shared/schema/primitives';
import type { Catalogue, SessionSummary, SessionView } from '@/shared/schema/views';
import type { DeviceTx } from '@/db/device/deviceDb';
import { getFact } from '@/db/device/meta';
import { peopleHere } from '@/db/device/rosterStore';
import { benchDevice } from '@/stores/bench/benchDevice';
import { useBenchStore } from '@/stores/bench/benchStore';
import { loadDraft } from '@/stores/bench/drafts';
import { safetyMark } from '@/stores/bench/verbs';
import { readUnsent, type UnsentItem } from '@/stores/bench/unsentWords';
import { readCatalogue, readSession, readSessions } from './benchReads';
import { useFollowCommits } from './followCommits';

/* What bench screens read: the device's own database, with or without a network. */

function useBenchQuery<T>(key: readonly string[], read: (tx: DeviceTx) => Promise<T>): UseQueryResult<T> {
  useFollowCommits();
  const isReady = useBenchStore((state) => state.phase === 'ready');
  return useQuery<T>({
    queryKey: ['bench', ...key],
    queryFn: () => read(benchDevice().db.read),
    enabled: isReady,
    networkMode: 'always',
    staleTime: Infinity,
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
    retry: false,
  });
}

/** Every session on this device. */
export const useBenchSessions = (): UseQueryResult<SessionSummary[]> =>
  useBenchQuery(['rest', 'sessions'], readSessions);

/** One session whole; null when this device does not hold it. */
export const useBenchSession = (id: string): UseQueryResult<SessionView | null> =>
  useBenchQuery(['session', id], (tx) => readSession(tx, id));

/** Customers, heads, stages and benches to start a session from. */
export const useBenchCatalogue = (): UseQueryResult<Catalogue> =>
  useBenchQuery(['rest', 'catalogue'], readCatalogue);

/** A person who may sign in at the bench. */
export type RosterItem = { id: string; name: string; roles: Role[]; hasPin: boolean };

/** The people of the shop, by name. */
export const useRoster = (): UseQueryResult<RosterItem[]> =>
  useBenchQuery(['rest', 'roster'], async (tx) =>
    (await peopleHere(tx)).map((row) => ({
      id: row.personId,
      name: row.name,
      roles: row.roles.flatMap((role) => RoleShape.safeParse(role).data ?? []),
      hasPin: row.pinHash !== null,
    })),
  );

/** What the shop has not taken: waiting, in dispute, held, set aside. */
export const useUnsent = (): UseQueryResult<UnsentItem[]> => useBenchQuery(['rest', 'unsent'], readUnsent);

/** True when the person signed in has read the safety card of the session on this device. */
export function useSafetyRead(sessionId: string): UseQueryResult<boolean> {
  const personId = useBenchStore((state) => state.person?.id ?? null);
  return useBenchQuery(['session', sessionId, 'safety', personId ?? ''], async (tx) =>
    ((await getFact(tx, 'safetyRead')) ?? []).includes(safetyMark(sessionId, personId)),
  );
}

/** What was half-keyed in a run when its screen was left. Read once: the screen owns it from then on. */
export function useDraft(runId: string): UseQueryResult<unknown> {
  const isReady = useBenchStore((state) => state.phase === 'ready');
  return useQuery({
    queryKey: ['bench', 'draft', runId],
    queryFn: () => loadDraft(runId),
    enabled: isReady,
    networkMode: 'always',
    staleTime: 0,
    gcTime: 0,
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
    retry: false,
  });
}
