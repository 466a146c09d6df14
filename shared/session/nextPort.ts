import type { Direction, Side } from '@/shared/schema/primitives';
import type { PortName } from '@/shared/schema/records';
import type { SessionView } from '@/shared/schema/views';

/** What the next run most likely is. */
export type RunProposal = { side: Side; port: string; direction: Direction; valvesOpenCount: number };

/** The port that comes next by itself: after the last run's port, the next one of its side without a run; then the
 * sides' ports that were left out, intake first. With every port run, the first one once more.
 * @returns null only for a head without ports
 */
export function nextPort(view: Pick<SessionView, 'head' | 'runs'>): PortName | null {
  const { ports } = view.head;
  const hasRun = (name: PortName) => view.runs.some(({ run }) => isSame(run, name));
  const last = view.runs.at(-1)?.run;
  const after = last ? ports.findIndex((name) => isSame(last, name)) : -1;
  return (
    ports.slice(after + 1).find((name) => name.side === last?.side && !hasRun(name)) ??
    ports.find((name) => name.side === 'intake' && !hasRun(name)) ??
    ports.find((name) => !hasRun(name)) ??
    ports[0] ??
    null
  );
}

/** A run of a port as the same side was run before, or as it usually is. */
export function proposeRun(view: Pick<SessionView, 'head' | 'runs'>, name: PortName): RunProposal {
  const like = view.runs.filter(({ run }) => run.side === name.side).at(-1)?.run;
  const valveCount = name.side === 'intake' ? view.head.intakeValveCount : view.head.exhaustValveCount;
  return {
    ...name,
    direction: like?.direction ?? (name.side === 'intake' ? 'drawing' : 'blowing'),
    valvesOpenCount: like?.valvesOpenCount ?? valveCount,
  };
}

function isSame(a: PortName, b: PortName): boolean {
  return a.side === b.side && a.port === b.port;
}
