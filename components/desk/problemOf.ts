import { AppError } from '@/shared/errors';

/** What a person reads about a failure, and what they hand on to whoever mends it. */
export type ShownProblem = { sentence: string; details: string };

/** Any failure as a sentence with its details. */
export function problemOf(error: unknown, sentences: Partial<Record<string, string>> = {}): ShownProblem {
  if (!(error instanceof AppError))
    return { sentence: 'The page had a fault. What was entered is still here.', details: String(error) };
  const requestId = error.extra.requestId;
  return {
    sentence: sentences[error.code] ?? error.message,
    details: `code ${error.code}${typeof requestId === 'string' ? `, request ${requestId}` : ''}`,
  };
}
