import type { DeviceTx } from '@/db/device/deviceDb';
import { getFacts, type DeviceIdentity, type DeviceShop } from '@/db/device/meta';
import { waitingOf } from '@/db/device/outbox';
import { readRefusals } from '@/db/device/unsettled';

/** Where the readings of this device are, in numbers. */
export type SyncCounts = {
  /** changes of every kind that wait */
  unsentCount: number;
  /** readings among what they are about */
  unsentReadingCount: number;
  setAsideCount: number;
  heldCount: number;
  disputeCount: number;
  oldestUnsentAt: string | null;
  lastSentAt: string | null;
  /** how far the server's clock is ahead, in milliseconds; null before the first answer */
  clockOffsetMs: number | null;
};

/** Reads who this device is and where its readings are. */
export async function readStatus(
  tx: DeviceTx,
): Promise<{ device: DeviceIdentity | null; shop: DeviceShop | null; counts: SyncCounts }> {
  const facts = await getFacts(tx);
  const waiting = await waitingOf(tx);
  const refusals = await readRefusals(tx);
  const countOf = (verdict: string) => refusals.filter(({ row }) => row.verdict === verdict).length;
  return {
    device: facts.device ?? null,
    shop: facts.shop ?? null,
    counts: {
      unsentCount: waiting.count,
      unsentReadingCount: waiting.readingCount,
      oldestUnsentAt: waiting.oldestAt,
      setAsideCount: countOf('rejected'),
      heldCount: countOf('held'),
      disputeCount: countOf('dispute'),
      lastSentAt: facts.lastSentAt ?? null,
      clockOffsetMs: facts.clockOffsetMs ?? null,
    },
  };
}
