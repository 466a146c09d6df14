import type { RunDraft } from './runDraft';

/** Keeps the newest draft of a run on the device: one write at a time, and only the newest of those that wait. */
export type DraftKeeper = {
  keep: (draft: RunDraft) => void;
  /** forgets what waits: a saved reading writes its own draft, in its own transaction */
  drop: () => void;
};

/** @param write resolves when the draft is durable @param onTrouble told whether the last write went wrong */
export function createDraftKeeper(
  write: (draft: RunDraft) => Promise<void>,
  onTrouble: (isTrouble: boolean) => void,
): DraftKeeper {
  let next: RunDraft | null = null;
  let isWriting = false;

  async function work(): Promise<void> {
    isWriting = true;
    while (next) {
      const draft = next;
      next = null;
      await write(draft).then(
        () => onTrouble(false),
        () => onTrouble(true),
      );
    }
    isWriting = false;
  }

  return {
    keep: (draft) => {
      next = draft;
      if (!isWriting) void work();
    },
    drop: () => {
      next = null;
    },
  };
}
