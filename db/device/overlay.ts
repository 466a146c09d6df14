import { groupOf } from '@/shared/sync/syncTables';
import { merge, type Guard, type Row } from '@/shared/sync/merge';
import type { Change, Verdict } from '@/shared/sync/protocol';

/* overlay: what the operator sees of one record. Pure.
 *
 * Over the server's copy are laid, in the order they were made:
 *   waiting changes                 through merge, as the server will judge them
 *   applied changes                 while the feed has not yet brought the version they made
 *   a create that was held or set aside, and what was done to it since: nothing keyed vanishes from the screen
 * A patch that was held, set aside or disputed is not laid: the server's value stands there with the mark.
 *
 * Mark: a waiting change > an unsettled dispute, held or set-aside change (the newest) > sent.
 */

export type Mark = 'onDevice' | 'sent' | 'dispute' | 'held' | 'setAside';

/** A change in the device's queue, with the server's answer when there is one. */
export type QueuedChange = { change: Change; verdict: Verdict | null; appliedVersion: number | null };

/** The device cannot know what the server will find; it draws its changes as if every door were open. */
const openDoors: Guard = {
  source: 'device',
  sessionState: 'open',
  standing: 'open',
  parent: 'present',
  isSeenCurrent: true,
};

/** The record as the device shows it.
 * @param copy the server's copy, or null when the feed has brought none
 * @param queued the device's own changes to this record, in order
 * @returns null when there is nothing to show
 */
export function overlay(copy: Row | null, queued: readonly QueuedChange[]): { row: Row; mark: Mark } | null {
  const isOwnUnstored = copy === null && queued.some((q) => q.change.kind === 'create' && isRefused(q));
  let row = copy;
  for (const q of queued) {
    if (q.verdict === null || (isOwnUnstored && q.verdict !== 'applied')) row = lay(row, q.change);
    else if (q.verdict === 'applied' && (copy === null || (q.appliedVersion ?? 0) > copy.version))
      row = layApplied(row, q.change, q.appliedVersion);
    else if (q.change.kind === 'create' && isRefused(q)) row = lay(row, q.change);
  }
  return row === null ? null : { row, mark: markOf(queued) };
}

/** Refused or held changes that no later change of this device has made good. */
export function unsettled(queued: readonly QueuedChange[]): QueuedChange[] {
  return queued.filter(
    (q, index) =>
      q.verdict !== null &&
      q.verdict !== 'applied' &&
      !queued
        .slice(index + 1)
        .some((later) => later.verdict === 'applied' && makesGood(later.change, q.change)),
  );
}

function markOf(queued: readonly QueuedChange[]): Mark {
  if (queued.some((q) => q.verdict === null)) return 'onDevice';
  const newest = unsettled(queued).at(-1);
  if (!newest) return 'sent';
  return newest.verdict === 'rejected' ? 'setAside' : newest.verdict === 'held' ? 'held' : 'dispute';
}

function makesGood(later: Change, earlier: Change): boolean {
  if (later.kind === 'delete') return true;
  if (later.kind !== earlier.kind) return false;
  if (later.kind === 'handIn') return true;
  const groups = new Set(Object.keys(later.set).map(groupOf));
  return Object.keys(earlier.set).every((field) => groups.has(groupOf(field)));
}

const isRefused = (q: QueuedChange): boolean => q.verdict === 'held' || q.verdict === 'rejected';

function lay(row: Row | null, change: Change): Row | null {
  // version 0: the server has never numbered it
  if (change.kind === 'create')
    return row ?? { id: change.rid, version: 0, deleted: false, fields: change.set };
  return row === null ? null : merge(row, change, openDoors).row;
}

/** The server took it: its values hold, whatever the older copy says. */
function layApplied(row: Row | null, change: Change, version: number | null): Row | null {
  const before = row ?? { id: change.rid, version: 0, deleted: false, fields: {} };
  if (row === null && change.kind !== 'create') return null;
  const fields = { ...before.fields, ...(change.kind === 'handIn' ? { state: 'handedIn' } : change.set) };
  return {
    id: change.rid,
    version: Math.max(before.version, version ?? 0),
    deleted: before.deleted || change.kind === 'delete',
    fields,
  };
}
