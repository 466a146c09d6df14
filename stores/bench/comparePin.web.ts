import { compare } from 'bcryptjs';

let worker: Worker | null = null;
let isWorkerBroken = false;
let questionCount = 0;
const waiting = new Map<number, { pin: string; hash: string; answer: (isRight: boolean) => void }>();

/** Compares a PIN with its verifier in a worker; where none can be started, here. @returns false also for a broken
 * verifier */
export function comparePin(pin: string, hash: string): Promise<boolean> {
  return new Promise((answer) => {
    questionCount += 1;
    waiting.set(questionCount, { pin, hash, answer });
    ask(questionCount);
  });
}

function ask(id: number): void {
  const question = waiting.get(id);
  if (!question) return;
  const started = isWorkerBroken ? null : startWorker();
  if (started) started.postMessage({ id, pin: question.pin, hash: question.hash });
  else void compareHere(id);
}

async function compareHere(id: number): Promise<void> {
  const question = waiting.get(id);
  if (question) answerTo(id, await compare(question.pin, question.hash).catch(() => false));
}

function answerTo(id: number, isRight: boolean): void {
  waiting.get(id)?.answer(isRight);
  waiting.delete(id);
}

function startWorker(): Worker | null {
  if (worker) return worker;
  try {
    // Metro bundles a worker only when it is written exactly like this
    worker = new Worker(new URL('./pinWorker', window.location.href));
  } catch {
    isWorkerBroken = true;
    return null;
  }
  worker.onmessage = (event: MessageEvent<{ id: number; isRight: boolean }>) =>
    answerTo(event.data.id, event.data.isRight);
  worker.onerror = () => {
    isWorkerBroken = true;
    for (const id of [...waiting.keys()]) void compareHere(id);
  };
  return worker;
}
