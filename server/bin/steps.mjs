// What a person at the terminal sees: numbered steps with their times, and one clear sentence when something is in the
// way. Node built-ins only.
import { spawn } from 'node:child_process';
import { root } from './paths.mjs';

/** Something a person can mend; shown as a sentence, without a stack. */
export class Obstacle extends Error {}

/** One line to the terminal. */
export const say = (text) => console.log(`[inchwater] ${text}`);

const seconds = (since) => `${((Date.now() - since) / 1000).toFixed(1)} s`;
const dotEveryMs = 10_000;

/**
 * Numbered steps: `await step('PostgreSQL', fn)` prints "[inchwater] 2/7 PostgreSQL … 2.1 s".
 * Work that `talks` writes lines of its own: the step's line is ended before it begins.
 */
export function numberedSteps(total) {
  let number = 0;
  return async function step(name, work, { talks = false } = {}) {
    number += 1;
    const start = Date.now();
    process.stdout.write(`[inchwater] ${number}/${total} ${name} …${talks ? '\n' : ''}`);
    if (talks) return work();
    // long work shows that it lives
    const ticking = setInterval(
      () => process.stdout.write(` ${Math.round((Date.now() - start) / 1000)} s …`),
      dotEveryMs,
    );
    try {
      const result = await work();
      process.stdout.write(` ${seconds(start)}\n`);
      return result;
    } catch (error) {
      process.stdout.write(' stopped\n');
      throw error;
    } finally {
      clearInterval(ticking);
    }
  };
}

const children = new Set();

/** Ends the programs that `run` has started and that still run. */
export function stopChildren(signal = 'SIGTERM') {
  for (const child of children) child.kill(signal);
}

/**
 * Runs a program in the project folder and waits for it.
 * @param options {env, show: print what it says at once}
 * @returns what it printed to stdout
 * @throws Obstacle with the end of what it said
 */
export function run(command, args, { env = {}, show = false } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, {
      cwd: root,
      env: { ...process.env, ...env },
      stdio: ['ignore', show ? 'inherit' : 'pipe', show ? 'inherit' : 'pipe'],
    });
    children.add(child);
    let printed = '';
    let all = '';
    child.stdout?.on('data', (chunk) => ((printed += chunk), (all += chunk)));
    child.stderr?.on('data', (chunk) => (all += chunk));
    child.once('error', (error) => {
      children.delete(child);
      reject(new Obstacle(`${command} could not be started: ${error.message}`));
    });
    child.once('close', (code, signal) => {
      children.delete(child);
      if (code === 0) return resolve(printed);
      const full = /ENOSPC|no space left on device/i.test(all)
        ? 'The disk is full. Make room and start again.\n'
        : '';
      const tail = all.trim().split('\n').slice(-25).join('\n');
      reject(new Obstacle(`${full}${[command, ...args].join(' ')} ended with ${code ?? signal}.\n${tail}`));
    });
  });
}

/** Says at the terminal what stands in the way: a sentence for an obstacle, the whole story for a fault of ours. */
export const explain = (error) =>
  console.error(`[inchwater] ${error instanceof Obstacle ? error.message : (error.stack ?? error)}`);
