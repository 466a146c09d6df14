import { compareSync } from 'bcryptjs';

/* Runs in a worker of its own: comparing a PIN takes a good part of a second on a tablet, and the screen must not stop
 * for it. */

type Question = { id: number; pin: string; hash: string };

self.onmessage = (event: MessageEvent<Question>) => {
  const { id, pin, hash } = event.data;
  let isRight = false;
  try {
    isRight = compareSync(pin, hash);
  } catch {
    // a verifier that is none matches nothing
  }
  self.postMessage({ id, isRight });
};
