import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { AppError } from '@/shared/errors';
import {
  DeviceList,
  EnrolmentCode,
  PeopleList,
  SessionList,
  type DeskChange,
  type PlanSessionRequest,
} from '@/shared/schema/api';
import { Catalogue, SessionView } from '@/shared/schema/views';
import { callDesk } from '@/stores/desk/callDesk';
import { listenToDesk } from '@/stores/desk/deskEvents';
import { useDeskStore } from '@/stores/desk/deskStore';
import { coalesce } from '@/stores/desk/coalesce';
import { useNewsStore } from '@/stores/desk/newsStore';
import { DeskChangesAnswer, PlannedSession } from './deskAnswers';

/* What desk screens read and do, over the API. Everything is asked as the person signed in, and kept apart by person:
 * what one saw is never shown to the next. */

const usePersonKey = () => useDeskStore((state) => `person-${state.personOrdinal}`);
const useIsSignedIn = () => useDeskStore((state) => state.phase === 'signedIn');

/** Tries again by itself only where trying again can help, and not for ever. */
const retry = (count: number, error: Error) =>
  error instanceof AppError && error.again === 'later' && error.code !== 'offline' && count < 2;

function useDeskQuery<T>(name: readonly string[], ask: (signal: AbortSignal) => Promise<T>) {
  const person = usePersonKey();
  return useQuery<T>({
    queryKey: ['desk', person, ...name],
    queryFn: ({ signal }) => ask(signal),
    enabled: useIsSignedIn(),
    networkMode: 'always',
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
    retry,
    retryDelay: 1500,
  });
}

/** Every session of the shop, as the list shows them. */
export const useSessions = () =>
  useDeskQuery(['sessions'], (signal) =>
    callDesk({ method: 'GET', path: '/api/sessions', schema: SessionList, signal }),
  );

/** One session with its runs and readings. */
export const useSession = (id: string) =>
  useDeskQuery(['session', id], (signal) =>
    callDesk({ method: 'GET', path: `/api/sessions/${encodeURIComponent(id)}`, schema: SessionView, signal }),
  );

/** Customers, heads, stages and benches to choose among. */
export const useCatalogue = () =>
  useDeskQuery(['catalogue'], (signal) =>
    callDesk({ method: 'GET', path: '/api/catalogue', schema: Catalogue, signal }),
  );

export const useDevices = () =>
  useDeskQuery(['devices'], (signal) =>
    callDesk({ method: 'GET', path: '/api/devices', schema: DeviceList, signal }),
  );

export const usePeople = () =>
  useDeskQuery(['people'], (signal) =>
    callDesk({ method: 'GET', path: '/api/people', schema: PeopleList, signal }),
  );

function useDeskMutation<Input, Output>(ask: (input: Input) => Promise<Output>, changes: readonly string[]) {
  const client = useQueryClient();
  const person = usePersonKey();
  return useMutation<Output, Error, Input>({
    mutationFn: ask,
    networkMode: 'always',
    onSuccess: () =>
      Promise.all(changes.map((name) => client.invalidateQueries({ queryKey: ['desk', person, name] }))),
  });
}

export const usePlanSession = () =>
  useDeskMutation(
    (body: PlanSessionRequest) =>
      callDesk({ method: 'POST', path: '/api/sessions', body, schema: PlannedSession }),
    ['sessions'],
  );

/** Sends changes made at the desk; the answer carries a verdict for each. */
export const useDeskChanges = () =>
  useDeskMutation(
    (changes: DeskChange[]) =>
      callDesk({ method: 'POST', path: '/api/changes', body: { changes }, schema: DeskChangesAnswer }),
    ['catalogue', 'sessions', 'session'],
  );

export const useMakeEnrolmentCode = () =>
  useDeskMutation(
    (_: void) =>
      callDesk({ method: 'POST', path: '/api/devices/enrolment-codes', body: {}, schema: EnrolmentCode }),
    [],
  );

export const useRevokeDevice = () =>
  useDeskMutation(
    (deviceId: string) =>
      callDesk({ method: 'POST', path: `/api/devices/${deviceId}/revoke`, body: {}, schema: null }),
    ['devices'],
  );

export const useSetPin = () =>
  useDeskMutation(
    ({ personId, pin }: { personId: string; pin: string }) =>
      callDesk({ method: 'PUT', path: `/api/people/${personId}/pin`, body: { pin }, schema: null }),
    ['people'],
  );

/** Keeps what is on screen up to date for as long as the desk is open. Call it once, in the desk's layout. */
export function useDeskNews(): void {
  const client = useQueryClient();
  const isSignedIn = useIsSignedIn();
  const person = usePersonKey();
  const setLive = useNewsStore((state) => state.setLive);
  useEffect(() => {
    if (!isSignedIn) return;
    return listenToDesk({
      onPoke: coalesce(() => client.invalidateQueries({ queryKey: ['desk', person] })),
      onLive: setLive,
    });
  }, [client, isSignedIn, person, setLive]);
  // who left leaves nothing behind in the page's memory
  useEffect(() => () => client.removeQueries({ queryKey: ['desk', person] }), [client, person]);
}
