import { callApi, openStream, type ApiRequest } from '@/stores/http/apiClient';
import { isSignInOver, useDeskStore } from './deskStore';

/** One request as the person who is signed in. A token that was turned away is renewed once and the request repeated:
 * a refused request did nothing, so repeating it is safe.
 */
export async function callDesk<T>(request: Omit<ApiRequest<T>, 'token'>): Promise<T> {
  return withToken((token) => callApi({ ...request, token }));
}

/** Opens the stream of pokes as the person who is signed in. */
export async function openDeskStream(path: string, signal: AbortSignal): Promise<Response> {
  return withToken((token) => openStream({ path, token, signal }));
}

async function withToken<T>(ask: (token: string) => Promise<T>): Promise<T> {
  const { freshToken } = useDeskStore.getState();
  const token = await freshToken();
  try {
    return await ask(token);
  } catch (error) {
    if (!isSignInOver(error)) throw error;
    return ask(await freshToken(token));
  }
}
