import type { ErrorRequestHandler, Response } from 'express';
import { AppError, type ErrorCode } from '@/shared/errors';
import { isPassingTrouble } from '@/db/server/databaseErrors';

/** What Express and its parsers call their errors, and what we call them. */
const codeOfType: Record<string, ErrorCode> = {
  'entity.parse.failed': 'bad_json',
  'entity.too.large': 'too_large',
  'encoding.unsupported': 'unsupported_type',
  'charset.unsupported': 'unsupported_type',
};

/** Any error as one of the closed table. */
export function appErrorOf(error: unknown): AppError {
  if (error instanceof AppError) return error;
  if (isPassingTrouble(error)) return new AppError('busy');
  const { type, status } = (typeof error === 'object' ? (error ?? {}) : {}) as Record<string, unknown>;
  const code = typeof type === 'string' ? codeOfType[type] : undefined;
  if (code) return new AppError(code);
  const isTheirs = Number(status) >= 400 && Number(status) < 500;
  return new AppError(isTheirs ? 'bad_request' : 'internal');
}

/** Sends a refusal as problem details (RFC 9457) with its code. */
export function sendProblem(response: Response, error: AppError, requestId: string): void {
  if (error.code === 'busy' && !response.hasHeader('Retry-After')) response.set('Retry-After', '2');
  if (error.status === 401) response.set('WWW-Authenticate', 'Bearer');
  response
    .status(error.status)
    .set('Cache-Control', 'no-store')
    .type('application/problem+json')
    .send(
      JSON.stringify({
        ...error.extra,
        type: `urn:inchwater:problem:${error.code}`,
        title: error.message,
        status: error.status,
        code: error.code,
        requestId,
        ...(error.fields.length > 0 ? { fields: error.fields } : {}),
      }),
    );
}

/** The last stop of every error. */
export const problemHandler: ErrorRequestHandler = (error, request, response, next) => {
  const told = appErrorOf(error);
  if (told.status >= 500) request.log.error({ err: error, code: told.code }, 'request failed');
  if (response.headersSent) return next(error);
  sendProblem(response, told, String(request.id));
};
