import { useEffect, useState } from 'react';
import { useStore } from 'zustand';
import type { SessionView } from '@/shared/schema/views';
import { saveDraft } from '@/stores/bench/drafts';
import { addRung, saveReading, skipRung, undoReading, unskipRung } from '@/stores/bench/verbs';
import { usePreferencesStore } from '@/stores/preferences/preferencesStore';
import { holdDigits } from './heldDigits';
import { createRunCapture, type RunCapture, type RunCaptureState } from './runCapture';
import type { RunDraft } from './runDraft';

/** The capture screen of one run over the device's database. Mount it anew for another run. */
export function useRunCapture(
  view: SessionView,
  runId: string,
  draft: RunDraft | null,
): { capture: RunCapture; state: RunCaptureState } {
  const bounceMs = usePreferencesStore((preferences) => preferences.bounceMs);
  const [capture] = useState(() =>
    createRunCapture({
      view,
      runId,
      draft,
      bounceMs,
      nowMs: () => Date.now(),
      verbs: { saveReading, undoReading, skipRung, unskipRung, addRung, saveDraft },
      onDigits: holdDigits,
    }),
  );
  useEffect(() => capture.setView(view), [capture, view]);
  return { capture, state: useStore(capture.store) };
}
