import { useEffect, useRef } from 'react';
import { hardwareKey } from '@/shared/entry/hardwareKey';
import type { KeypadEvent } from '@/shared/entry/keypad';

/** Keys that belong to something else: a field, a sheet in front, a button that Enter should press. */
function belongsElsewhere(event: KeyboardEvent): boolean {
  if (event.ctrlKey || event.metaKey || event.altKey) return true;
  const target = event.target instanceof Element ? event.target : null;
  if (!target) return false;
  if (target.closest('input, textarea, select, [contenteditable=true], [role=dialog]')) return true;
  return event.key === 'Enter' && target.closest('button, a, [role=button]') !== null;
}

/** Sends digits, mark, Enter, Backspace and Esc of a hardware keyboard to the pad, as if its keys were pressed. */
export function useHardwareKeys(onEvent: (event: KeypadEvent) => void, isOn: boolean) {
  const latest = useRef(onEvent);
  useEffect(() => {
    latest.current = onEvent;
  }, [onEvent]);
  useEffect(() => {
    if (!isOn) return;
    const down = (event: KeyboardEvent) => {
      const key = hardwareKey(event.key);
      // a key held down is one key; the keyboard's own repeat is not the operator's
      if (!key || event.repeat || belongsElsewhere(event)) return;
      event.preventDefault();
      latest.current({ type: 'press', key, atMs: event.timeStamp });
    };
    const up = (event: KeyboardEvent) => {
      const key = hardwareKey(event.key);
      if (key)
        latest.current({ type: 'release', key, atMs: event.timeStamp, isInside: !belongsElsewhere(event) });
    };
    window.addEventListener('keydown', down);
    window.addEventListener('keyup', up);
    return () => {
      window.removeEventListener('keydown', down);
      window.removeEventListener('keyup', up);
    };
  }, [isOn]);
}
