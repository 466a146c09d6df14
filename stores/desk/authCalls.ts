import { callApi } from '@/stores/http/apiClient';
import { SignedIn } from '@/shared/schema/api';

/* The doors of signing in. The refresh token travels in an httpOnly cookie that no script sees. */

/** Signs in by mail and password. @throws AppError `wrong_sign_in`, `too_many_tries`, `offline` … */
export const askSignIn = (mail: string, password: string): Promise<SignedIn> =>
  callApi({ method: 'POST', path: '/api/auth/sign-in', body: { mail, password }, schema: SignedIn });

/** A new access token for the cookie this browser holds. @throws AppError `sign_in_needed`, `sign_in_ended` … */
export const askRefresh = (): Promise<SignedIn> =>
  callApi({ method: 'POST', path: '/api/auth/refresh', body: {}, schema: SignedIn });

/** Ends the sign-in of this browser. */
export const askSignOut = (token: string): Promise<void> =>
  callApi({ method: 'POST', path: '/api/auth/sign-out', body: {}, token, schema: null });

/** Ends every sign-in of this person. */
export const askSignOutEverywhere = (token: string): Promise<void> =>
  callApi({ method: 'POST', path: '/api/auth/sign-out-everywhere', body: {}, token, schema: null });
