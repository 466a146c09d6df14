import type { Response } from 'express';
import type { Deps } from '../deps';

/** Keeps an answer open and writes "something changed" into it. Nothing of a shop travels here: who is poked pulls, or
 * asks again, and is let in or not like always. While it stands, the right to it is looked at again with each beat.
 * @param isStillGood rejects or answers false when the one who listens may not any more
 * @returns when the stream has ended
 */
export async function streamPokes(
  deps: Pick<Deps, 'pokes' | 'heartbeatMs'>,
  shopId: string,
  response: Response,
  isStillGood: () => Promise<boolean>,
): Promise<void> {
  response.status(200).set({
    'Content-Type': 'text/event-stream; charset=utf-8',
    'Cache-Control': 'no-store, no-transform',
    'X-Accel-Buffering': 'no',
  });
  response.flushHeaders();
  response.write('retry: 3000\n\n');
  const stopListening = deps.pokes.listen(shopId, {
    onPoke: () => response.write('event: poke\ndata: {}\n\n'),
    onEnd: () => response.end(),
  });
  const beat = setInterval(() => {
    response.write(': still here\n\n');
    // the database being away is no reason to end it: that shows at the next request
    isStillGood().then(
      (isGood) => isGood || response.end(),
      () => undefined,
    );
  }, deps.heartbeatMs);
  await new Promise<void>((resolve) => response.once('close', resolve));
  clearInterval(beat);
  stopListening();
}
