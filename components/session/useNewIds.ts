import { useEffect, useRef, useState } from 'react';

const markedForMs = 8000;

/** Ids that came in while somebody was looking: marked for some seconds, never at the first look. */
export function useNewIds(ids: readonly string[]): ReadonlySet<string> {
  const seen = useRef<Set<string> | null>(null);
  const timers = useRef(new Set<ReturnType<typeof setTimeout>>());
  const [newIds, setNewIds] = useState<ReadonlySet<string>>(new Set());

  useEffect(() => {
    const known = seen.current;
    seen.current = new Set(ids);
    if (!known) return;
    const fresh = ids.filter((id) => !known.has(id));
    if (fresh.length === 0) return;
    setNewIds((before) => new Set([...before, ...fresh]));
    const timer = setTimeout(() => {
      timers.current.delete(timer);
      setNewIds((before) => new Set([...before].filter((id) => !fresh.includes(id))));
    }, markedForMs);
    timers.current.add(timer);
  }, [ids]);

  useEffect(() => {
    const running = timers.current;
    return () => running.forEach((timer) => clearTimeout(timer));
  }, []);

  return newIds;
}
