import { AppError } from '@/shared/errors';
import { Enrolled, EnrolRequest, RosterResponse } from '@/shared/schema/api';
import type { DeviceDb } from '@/db/device/deviceDb';
import { startReplay } from '@/db/device/feed';
import { getFacts, setFact } from '@/db/device/meta';
import { renumberWaiting } from '@/db/device/outbox';
import { storeRoster } from '@/db/device/rosterStore';
import type { callApi } from '@/stores/http/apiClient';

/** Enrols this device with a one-time code, for the first time or again. What waits here is kept: it takes its places
 * from 1 on under the new device, and whatever the server had already is recognised by its id.
 * @throws AppError `wrong_code`, `invalid` with the field, `offline`…; nothing here has changed then
 */
export async function enrolDevice(
  { db, call }: { db: DeviceDb; call: typeof callApi },
  code: string,
  deviceName: string,
): Promise<void> {
  const asked = EnrolRequest.safeParse({ code, deviceName });
  if (!asked.success)
    throw new AppError('invalid', {
      fields: asked.error.issues.map((issue) => ({
        path: issue.path.map(String).join('.'),
        sentence: issue.message,
      })),
    });
  const enrolled = await call({
    method: 'POST',
    path: '/api/sync/enrol',
    body: asked.data,
    schema: Enrolled,
  });
  const roster = await call({
    method: 'GET',
    path: '/api/sync/roster',
    token: enrolled.token,
    schema: RosterResponse,
  });
  await db.tx(async (tx) => {
    const before = await getFacts(tx);
    if (before.shop && before.shop.id !== roster.shop.id)
      throw new AppError('invalid', {
        fields: [
          {
            path: 'code',
            sentence: `That code is from another shop. This device holds the readings of ${before.shop.name} and stays with it.`,
          },
        ],
      });
    await setFact(tx, 'device', {
      id: enrolled.deviceId,
      deviceOrdinal: enrolled.deviceOrdinal,
      name: asked.data.deviceName,
    });
    await setFact(tx, 'token', enrolled.token);
    await setFact(tx, 'standing', 'enrolled');
    await renumberWaiting(tx, 1);
    if (before.device === undefined) {
      await setFact(tx, 'epoch', enrolled.epoch);
      await setFact(tx, 'cursor', 0);
      await setFact(tx, 'seen', '');
    } else if (before.epoch !== enrolled.epoch) await startReplay(tx, enrolled.epoch);
    await storeRoster(tx, roster);
  });
}
