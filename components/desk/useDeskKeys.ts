import { useEffect } from 'react';

/** Acts on single keys, except while somebody types or something lies in front of the screen. */
export function useDeskKeys(acts: Readonly<Record<string, (() => void) | null>>): void {
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.ctrlKey || event.metaKey || event.altKey || event.defaultPrevented) return;
      if (document.querySelector('[role=dialog]')) return;
      const target = event.target instanceof HTMLElement ? event.target : null;
      if (target?.closest('input, textarea, select, [contenteditable=true]')) return;
      const act = acts[event.key.length === 1 ? event.key.toLowerCase() : event.key];
      if (!act) return;
      event.preventDefault();
      act();
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, [acts]);
}
