import { errors, jwtVerify, SignJWT } from 'jose';
import { z } from 'zod';
import { AppError } from '@/shared/errors';
import { Id } from '@/shared/schema/primitives';
import type { Deps } from '../deps';

/* Two tokens, both HS256 under one secret and told apart by their audience. The access token names person and sign-in
 * and nothing it could empower: roles are looked up at each request. */

export const accessSeconds = 600;
export const refreshSeconds = 30 * 24 * 3600;

export const Claims = z.object({ shop: Id, sub: Id, family: Id });
export type Claims = z.infer<typeof Claims>;
export const RefreshClaims = Claims.extend({ jti: Id });
export type RefreshClaims = z.infer<typeof RefreshClaims>;

type Keys = Pick<Deps, 'jwtSecret' | 'clock'>;
const issuer = 'inchwater';

async function sign(keys: Keys, audience: string, claims: Claims & { jti?: string }, seconds: number) {
  const now = Math.floor(keys.clock().getTime() / 1000);
  return new SignJWT({ ...claims })
    .setProtectedHeader({ alg: 'HS256' })
    .setIssuer(issuer)
    .setAudience(audience)
    .setIssuedAt(now)
    .setExpirationTime(now + seconds)
    .sign(keys.jwtSecret);
}

export const signAccess = (keys: Keys, claims: Claims) => sign(keys, 'desk', claims, accessSeconds);
export const signRefresh = (keys: Keys, claims: RefreshClaims) =>
  sign(keys, 'refresh', claims, refreshSeconds);

async function read<T>(keys: Keys, audience: string, schema: z.ZodType<T>, token: string): Promise<T> {
  try {
    const { payload } = await jwtVerify(token, keys.jwtSecret, {
      algorithms: ['HS256'],
      issuer,
      audience,
      currentDate: keys.clock(),
    });
    return schema.parse(payload);
  } catch (error) {
    if (error instanceof errors.JOSEError || error instanceof z.ZodError)
      throw new AppError('sign_in_needed');
    throw error;
  }
}

/** @throws AppError `sign_in_needed` when it is none of ours or its time is over */
export const readAccess = (keys: Keys, token: string) => read(keys, 'desk', Claims, token);
/** @throws AppError `sign_in_needed` when it is none of ours or its time is over */
export const readRefresh = (keys: Keys, token: string) => read(keys, 'refresh', RefreshClaims, token);
