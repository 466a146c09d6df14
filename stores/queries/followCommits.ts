import { useQueryClient, type QueryClient } from '@tanstack/react-query';
import { useEffect } from 'react';
import { onBenchCommit } from '@/stores/bench/benchDevice';

const restMs = 250;
const following = new WeakMap<QueryClient, { count: number; stop: () => void }>();

/** Keeps what bench screens show in step with the device's database: after a commit the open session is read again at
 * once, everything else when it has been quiet for a moment, so that a SAVE does not wait for lists behind it. */
export function useFollowCommits(): void {
  const client = useQueryClient();
  useEffect(() => follow(client), [client]);
}

function follow(client: QueryClient): () => void {
  const entry = following.get(client) ?? { count: 0, stop: start(client) };
  entry.count += 1;
  following.set(client, entry);
  return () => {
    entry.count -= 1;
    if (entry.count > 0) return;
    entry.stop();
    following.delete(client);
  };
}

function start(client: QueryClient): () => void {
  let timer: ReturnType<typeof setTimeout> | undefined;
  const stopListening = onBenchCommit(() => {
    void client.invalidateQueries({ queryKey: ['bench', 'session'] });
    clearTimeout(timer);
    timer = setTimeout(() => void client.invalidateQueries({ queryKey: ['bench', 'rest'] }), restMs);
  });
  return () => {
    clearTimeout(timer);
    stopListening();
  };
}
