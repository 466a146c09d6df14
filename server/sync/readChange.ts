import { z } from 'zod';
import { AppError } from '@/shared/errors';
import { Id } from '@/shared/schema/primitives';
import { Change } from '@/shared/sync/protocol';
import type { Incoming } from '@/db/server/sync/incoming';
import { unstorable } from '../http/unstorable';

const largestN = 2_147_483_647;

/** Enough of a change to answer it by name and keep its place in the order. */
const Named = z.looseObject({ id: Id, n: z.number().int().min(1).max(largestN) });

/** Reads one change of a push. One that is not right is refused by itself, so that it blocks no other.
 * @throws AppError `invalid` when it has not even a name and a place
 */
export function readChange(raw: unknown, index: number): Incoming {
  const trouble = unstorable(raw);
  const parsed = trouble ? null : Change.safeParse(raw);
  if (parsed?.success && parsed.data.n <= largestN)
    return { id: parsed.data.id, n: parsed.data.n, change: parsed.data, body: raw };
  const named = Named.safeParse(raw);
  if (!named.success)
    throw new AppError('invalid', {
      fields: [{ path: `changes.${index}`, sentence: 'has no id and place' }],
    });
  const { id, n } = named.data;
  if (trouble) return { id, n, change: null, problem: trouble, body: inText(raw) };
  const [issue] = parsed?.error?.issues ?? [];
  const problem = issue ? `${issue.path.map(String).join('.')}: ${issue.message}` : '';
  return { id, n, change: null, problem: problem.slice(0, 300).toWellFormed(), body: raw };
}

/** What PostgreSQL cannot store as it is, kept as escaped text; nested without end, it is not kept. */
function inText(raw: unknown): unknown {
  try {
    return { asText: JSON.stringify(raw) };
  } catch {
    return { asText: null };
  }
}
