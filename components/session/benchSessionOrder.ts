import type { SessionSummary } from '@/shared/schema/views';
import { stateWord } from './words';

/** A group of the bench's list. */
export type SessionGroup = { title: string; sessions: SessionSummary[] };

const groups: { word: string; title: string }[] = [
  { word: 'returned', title: 'Returned with remarks' },
  { word: 'planned', title: 'Planned' },
  { word: 'open', title: 'Open' },
  { word: 'handed in', title: 'Handed in' },
  { word: 'approved', title: 'Approved' },
];

/** The sessions by what is to be done with them: planned before open, what is done at the end. */
export function groupSessions(sessions: readonly SessionSummary[]): SessionGroup[] {
  return groups
    .map(({ word, title }) => ({
      title,
      sessions: sessions.filter((session) => stateWord(session) === word),
    }))
    .filter((group) => group.sessions.length > 0);
}
