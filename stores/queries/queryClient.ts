import { QueryClient } from '@tanstack/react-query';

/** One cache for the page. Nothing waits for the browser's opinion of the network: it is often wrong in a shed, and a
 * request that fails says `offline` by itself. */
export const queryClient = new QueryClient({
  defaultOptions: { queries: { networkMode: 'always' }, mutations: { networkMode: 'always' } },
});
