import express, { type Request, type Response } from 'express';
import { AppError } from '@/shared/errors';

const sizes = { usual: 64 * 1024, push: 1024 * 1024 } as const;
const readers = {
  usual: express.json({ limit: sizes.usual }),
  push: express.json({ limit: sizes.push }),
};

/** Reads the JSON body, after the one who sends it has been let in.
 * @throws AppError `unsupported_type`, `bad_json`, `too_large`
 */
export async function readBody(
  request: Request,
  response: Response,
  size: keyof typeof sizes = 'usual',
): Promise<unknown> {
  if (!request.is('application/json')) throw new AppError('unsupported_type');
  await new Promise<void>((resolve, reject) =>
    readers[size](request, response, (error?: unknown) => (error ? reject(error) : resolve())),
  );
  if (request.body === undefined) throw new AppError('bad_json');
  return request.body as unknown;
}
