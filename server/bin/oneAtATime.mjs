// A file that says which process is at work. It outlives a killed process, so whoever finds it asks whether that
// process still lives. Node built-ins only.
import fs from 'node:fs';
import path from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';

/** Names a process so that a later one with the same number is not taken for it. */
function markOf(pid) {
  try {
    const stat = fs.readFileSync(`/proc/${pid}/stat`, 'utf8');
    return `${pid} ${stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19]}`; // start time, in ticks since boot
  } catch {
    return `${pid}`;
  }
}

function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

function holderOf(file) {
  try {
    const mark = fs.readFileSync(file, 'utf8');
    const pid = Number(mark.split(' ')[0]);
    return pid && isAlive(pid) && markOf(pid) === mark ? pid : null;
  } catch {
    return null;
  }
}

/** Takes the file for this process. @returns null, or the number of the living process that has it */
export function takeFile(file) {
  fs.mkdirSync(path.dirname(file), { recursive: true });
  const mine = `${file}.${process.pid}`;
  fs.writeFileSync(mine, markOf(process.pid));
  try {
    for (;;) {
      try {
        fs.linkSync(mine, file); // appears with its content or not at all
        return null;
      } catch (error) {
        if (error.code !== 'EEXIST') throw error;
        const holder = holderOf(file);
        if (holder === process.pid) return null;
        if (holder) return holder;
        fs.rmSync(file, { force: true });
      }
    }
  } finally {
    fs.rmSync(mine, { force: true });
  }
}

/** Gives the file back. */
export const giveFile = (file) => fs.rmSync(file, { force: true });

/** Does the work while holding the file, waiting for whoever holds it now. */
export async function oneAtATime(file, work) {
  while (takeFile(file) !== null) await wait(200);
  try {
    return await work();
  } finally {
    giveFile(file);
  }
}
