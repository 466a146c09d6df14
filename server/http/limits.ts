import type { Request, Response } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import { AppError } from '@/shared/errors';

/** At most so many failed tries in so many seconds. */
export type Limit = { tries: number; seconds: number };

export type Limits = {
  /** for one mail address from one place: each step waits longer than the one before */
  signInByMail: Limit[];
  /** for one place, whatever address is tried */
  signInByPlace: Limit[];
  enrolByPlace: Limit[];
};

export const usualLimits: Limits = {
  signInByMail: [
    { tries: 5, seconds: 60 },
    { tries: 12, seconds: 15 * 60 },
    { tries: 40, seconds: 24 * 3600 },
  ],
  signInByPlace: [{ tries: 60, seconds: 15 * 60 }],
  enrolByPlace: [
    { tries: 8, seconds: 60 },
    { tries: 30, seconds: 15 * 60 },
  ],
};

export type Gate = (request: Request, response: Response) => Promise<void>;

/** A gate that closes after too many failed tries of one key; a try that succeeds is not counted.
 * @throws AppError `too_many_tries`; the answer says when to come back
 */
export function gateOf(limits: readonly Limit[], keyOf: (request: Request) => string = () => ''): Gate {
  const limiters = limits.map((limit) =>
    rateLimit({
      windowMs: limit.seconds * 1000,
      limit: limit.tries,
      skipSuccessfulRequests: true,
      standardHeaders: true,
      legacyHeaders: false,
      keyGenerator: (request) => `${ipKeyGenerator(request.ip ?? '')} ${keyOf(request)}`,
      handler: (_request, _response, next) => next(new AppError('too_many_tries')),
    }),
  );
  return async (request, response) => {
    for (const limiter of limiters)
      await new Promise<void>((resolve, reject) => {
        const next = (error?: unknown) => (error ? reject(error) : resolve());
        Promise.resolve(limiter(request, response, next)).catch(reject);
      });
  };
}
