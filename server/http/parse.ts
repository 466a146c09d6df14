import type { z } from 'zod';
import { AppError } from '@/shared/errors';
import { Id } from '@/shared/schema/primitives';
import { unstorable } from './unstorable';

/** Reads what came from outside. @throws AppError `invalid`, with the fields that are not right */
export function parse<T>(schema: z.ZodType<T>, raw: unknown): T {
  const trouble = unstorable(raw);
  if (trouble) throw new AppError('invalid', { fields: [{ path: '', sentence: trouble }] });
  const parsed = schema.safeParse(raw);
  if (parsed.success) return parsed.data;
  const fields = parsed.error.issues
    .slice(0, 20)
    .map((issue) => ({ path: issue.path.map(String).join('.'), sentence: issue.message }));
  throw new AppError('invalid', { fields });
}

/** An id in an address. What is no id names no record. @throws AppError `no_such_record` */
export function idInPath(raw: unknown): string {
  const parsed = Id.safeParse(raw);
  if (!parsed.success) throw new AppError('no_such_record');
  return parsed.data;
}
