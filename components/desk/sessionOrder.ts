import { stateWord } from '@/components/session/words';
import type { SessionSummary } from '@/shared/schema/views';

/** What the list is narrowed to; both come from the address. */
export type SessionFilter = { state: string; text: string };

/** States a list can be narrowed to, in the words shown. */
export const stateFilters = ['all', 'planned', 'open', 'handed in', 'returned', 'approved'] as const;

/** The sessions that fit, oldest unfinished first and approved ones, newest first, at the end. Ids are in order of
 * birth, so they serve as the age.
 */
export function sessionsToShow(sessions: readonly SessionSummary[], filter: SessionFilter): SessionSummary[] {
  const words = filter.text.toLowerCase().split(/\s+/).filter(Boolean);
  return sessions
    .filter((session) => filter.state === 'all' || stateWord(session) === filter.state)
    .filter((session) => words.every((word) => searchable(session).includes(word)))
    .sort((a, b) => {
      const isDoneA = a.state === 'approved';
      if (isDoneA !== (b.state === 'approved')) return isDoneA ? 1 : -1;
      return isDoneA ? b.id.localeCompare(a.id) : a.id.localeCompare(b.id);
    });
}

function searchable(session: SessionSummary): string {
  const { label, customerName, headName, stageName, benchName, keyedBy } = session;
  return [label, customerName, headName, stageName, benchName, stateWord(session), ...keyedBy]
    .join(' ')
    .toLowerCase();
}

/** The state filter an address names, or all. */
export function stateFilterOf(text: string | undefined): string {
  return (stateFilters as readonly string[]).includes(text ?? '') ? (text as string) : 'all';
}

/** The sessions before and after one in a list; from nothing chosen, the first comes next. */
export function neighboursOf(
  shown: readonly SessionSummary[],
  selectedId: string | null,
): { earlierId: string | null; laterId: string | null } {
  const at = shown.findIndex((session) => session.id === selectedId);
  if (at < 0) return { earlierId: null, laterId: shown[0]?.id ?? null };
  return { earlierId: shown[at - 1]?.id ?? null, laterId: shown[at + 1]?.id ?? null };
}

/** Address of a session, with the list narrowed as it was. */
export function sessionHref(sessionId: string | null, filter: SessionFilter): string {
  const query = new URLSearchParams();
  if (filter.state !== 'all') query.set('state', filter.state);
  if (filter.text.trim()) query.set('find', filter.text.trim());
  const text = query.toString();
  return `${sessionId ? `/desk/sessions/${sessionId}` : '/desk'}${text ? `?${text}` : ''}`;
}
