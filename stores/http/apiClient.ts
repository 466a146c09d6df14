import type { z } from 'zod';
import { AppError, isErrorCode, type ErrorCode } from '@/shared/errors';
import { Problem } from '@/shared/schema/api';

/** One request to the API. Paths start with `/api/`. */
export type ApiRequest<T> = {
  method: 'GET' | 'POST' | 'PUT' | 'DELETE';
  path: string;
  body?: unknown;
  /** access token of a person or token of a device; none for the doors that need none */
  token?: string | null;
  /** shape of the answer; null when nothing comes back */
  schema: z.ZodType<T> | null;
  timeoutMs?: number;
  signal?: AbortSignal;
};

const usualTimeoutMs = 15_000;

/** Sends one request and parses its answer. Every failure is an `AppError` of the closed table: what the server said,
 * or `offline` and `timeout` when it could not say anything.
 * @throws AppError
 */
export async function callApi<T>(request: ApiRequest<T>): Promise<T> {
  return inTime(request.signal, request.timeoutMs ?? usualTimeoutMs, async (signal) => {
    const response = await send(request, 'application/json', signal);
    if (!response.ok) throw await problemOf(response);
    if (request.schema === null) return undefined as T;
    const body = await readJson(response);
    // a Wi-Fi's sign-in page answers 200 with a page of its own: that is no answer of ours
    if (body === undefined) throw new AppError('offline');
    const parsed = request.schema.safeParse(body);
    // an answer this version cannot read: an older page against a newer server
    if (!parsed.success) throw new AppError('update_needed');
    return parsed.data;
  });
}

/** Opens an answer that goes on, such as a stream of events. Only its beginning has to come in time. */
export async function openStream(request: {
  path: string;
  token: string;
  signal: AbortSignal;
}): Promise<Response> {
  const stop = new AbortController();
  request.signal.addEventListener('abort', () => stop.abort(), { once: true });
  const tooLate = setTimeout(() => stop.abort(), 10_000);
  try {
    const response = await send(
      { method: 'GET', path: request.path, token: request.token, schema: null },
      'text/event-stream',
      stop.signal,
    );
    if (!response.ok) throw await problemOf(response);
    return response;
  } catch (error) {
    throw error instanceof AppError ? error : new AppError('offline');
  } finally {
    clearTimeout(tooLate);
  }
}

/** Runs `work` with a signal that ends when the caller gives up or the time is over, and names which it was. */
async function inTime<T>(
  caller: AbortSignal | undefined,
  timeoutMs: number,
  work: (signal: AbortSignal) => Promise<T>,
): Promise<T> {
  const stop = new AbortController();
  let isTooLate = false;
  const timer = setTimeout(() => {
    isTooLate = true;
    stop.abort();
  }, timeoutMs);
  const onCallerStops = () => stop.abort();
  caller?.addEventListener('abort', onCallerStops);
  if (caller?.aborted) stop.abort();
  try {
    return await work(stop.signal);
  } catch (error) {
    if (error instanceof AppError) throw error;
    throw new AppError(isTooLate ? 'timeout' : 'offline');
  } finally {
    clearTimeout(timer);
    caller?.removeEventListener('abort', onCallerStops);
  }
}

function send<T>(request: ApiRequest<T>, accept: string, signal: AbortSignal): Promise<Response> {
  const hasBody = request.body !== undefined;
  return fetch(request.path, {
    method: request.method,
    credentials: 'same-origin',
    cache: 'no-store',
    headers: {
      accept,
      ...(hasBody ? { 'content-type': 'application/json' } : {}),
      ...(request.token ? { authorization: `Bearer ${request.token}` } : {}),
    },
    ...(hasBody ? { body: JSON.stringify(request.body) } : {}),
    signal,
  });
}

/** The body as JSON; undefined when it is none. */
async function readJson(response: Response): Promise<unknown> {
  const text = await response.text();
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

/** The refusal in a response. Something between us and the server that answers without our code is told by its status. */
async function problemOf(response: Response): Promise<AppError> {
  const parsed = Problem.safeParse(await readJson(response));
  const retryAfterSeconds = Number(response.headers.get('retry-after'));
  const wait = retryAfterSeconds > 0 ? { retryAfterSeconds } : {};
  if (!parsed.success || !isErrorCode(parsed.data.code))
    return new AppError(codeOfStatus(response.status), { extra: wait });
  const { type: _type, title: _title, status: _status, code, fields, ...extra } = parsed.data;
  return new AppError(code, { fields: fields ?? [], extra: { ...extra, ...wait } });
}

function codeOfStatus(status: number): ErrorCode {
  if (status === 401) return 'sign_in_needed';
  if (status === 403) return 'not_allowed';
  if (status === 404) return 'not_found';
  if (status === 413) return 'too_large';
  if (status === 426) return 'update_needed';
  if (status === 429) return 'too_many_tries';
  if (status === 502 || status === 503 || status === 504) return 'busy';
  return status >= 500 ? 'internal' : 'bad_request';
}

/** Seconds the server asked to wait, or null when it did not say. */
export function waitSecondsOf(error: AppError): number | null {
  const seconds = error.extra.retryAfterSeconds;
  return typeof seconds === 'number' ? seconds : null;
}
