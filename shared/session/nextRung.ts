import type { Pass } from '@/shared/schema/primitives';
import type { RungRow, RunView } from '@/shared/schema/views';
import { readNumber } from '@/shared/units/quantity';

/** The rungs of a run, lowest lift first. A lift added to the run takes its place among the others; lifts in different
 * units cannot be compared without a valve diameter and keep the plan's order. */
export function rungsByLift<T extends Pick<RungRow, 'liftText' | 'liftUnit' | 'rungOrdinal'>>(
  rungs: readonly T[],
): T[] {
  const isOneUnit = new Set(rungs.map((rung) => rung.liftUnit)).size <= 1;
  return [...rungs].sort((a, b) => {
    const byLift = isOneUnit ? readNumber(a.liftText) - readNumber(b.liftText) : 0;
    return byLift === 0 ? a.rungOrdinal - b.rungOrdinal : byLift;
  });
}

/** The rung to key after `fromRungId`: the next one in the run's direction of pass that has no reading and is not
 * skipped; past the end, the first that was left out.
 * @param keyedIds rungs to be taken as keyed although the view does not show it yet
 * @returns null when nothing is left to key
 */
export function nextRung(
  view: RunView,
  fromRungId: string | null,
  keyedIds: readonly string[] = [],
): RungRow | null {
  const inOrder = inPass(rungsByLift(view.rungs), view.run.pass);
  const keyed = new Set([
    ...keyedIds,
    ...view.readings.filter((reading) => reading.isUsed).map((r) => r.rungId),
  ]);
  const isOpen = (rung: RungRow) => !rung.isSkipped && !keyed.has(rung.id);
  const at = inOrder.findIndex((rung) => rung.id === fromRungId);
  return inOrder.slice(at + 1).find(isOpen) ?? inOrder.find(isOpen) ?? null;
}

function inPass(rungs: RungRow[], pass: Pass): RungRow[] {
  return pass === 'down' ? rungs.reverse() : rungs;
}
