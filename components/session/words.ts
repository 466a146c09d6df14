import type { Role } from '@/shared/schema/primitives';
import type { CalibrationGrade, Chip, Run, SessionState } from '@/shared/schema/records';
import type { SessionSummary } from '@/shared/schema/views';

/* The words on screen for what code calls by its names: one place, so that a thing is called the same everywhere. */

const stateWords: Record<SessionState, string> = {
  open: 'open',
  handedIn: 'handed in',
  returned: 'returned',
  approved: 'approved',
};

/** A session's state in words: open and without a reading it is planned. */
export function stateWord(session: Pick<SessionSummary, 'state' | 'readingCount'>): string {
  return session.state === 'open' && session.readingCount === 0 ? 'planned' : stateWords[session.state];
}

const gradeWords: Record<CalibrationGrade, string> = {
  traceable: 'traceable: against a flow certificate',
  computed: 'computed: against a plate by its dimensions',
  comparative: 'comparative: against a reference head',
  none: 'none: figures compare on this bench only',
};
/** A calibration's grade and what it means. */
export const gradeWord = (grade: CalibrationGrade): string => gradeWords[grade];

const chipWords: Record<Chip, string> = {
  loud: 'loud',
  breaksAway: 'breaks away',
  unsteady: 'unsteady',
  stall: 'stall',
  leakHeard: 'leak heard',
};
/** A note chip in words. */
export const chipWord = (chip: Chip): string => chipWords[chip];

/** A run as people name it: "Intake 1, drawing, up". */
export function runTitle(run: Pick<Run, 'side' | 'port' | 'direction' | 'pass'>): string {
  const side = run.side === 'intake' ? 'Intake' : 'Exhaust';
  return `${side} ${run.port}, ${run.direction}, ${run.pass}`;
}

const roleWords: Record<Role, string> = {
  operator: 'keys at the bench',
  technician: 'corrects readings, keeps benches',
  supervisor: 'plans and approves',
  owner: 'runs the shop',
};
/** A role with what it does. */
export const roleWord = (role: Role): string => `${role}: ${roleWords[role]}`;
