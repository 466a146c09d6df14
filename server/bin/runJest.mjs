// Runs jest and says how many tests passed and failed. Node built-ins only.
import fs from 'node:fs';
import { spawn } from 'node:child_process';
import { inRoot, root } from './paths.mjs';
import { say } from './steps.mjs';

const graceMs = 20_000;

/** Counts of jest's own report; a file that could not run at all is a failure too. */
function readReport(file) {
  if (!fs.existsSync(file)) return { passed: 0, failed: 1, succeeded: false };
  const report = JSON.parse(fs.readFileSync(file, 'utf8'));
  const failed = report.numFailedTests + report.numRuntimeErrorTestSuites;
  return { passed: report.numPassedTests, failed, succeeded: report.success && failed === 0 };
}

/**
 * @param args    jest's arguments
 * @param onText  receives what jest says to a person, as it comes
 * @returns {done: promise of {passed, failed}, interrupt: ends it early, its cluster too}
 */
export function runJest(args, onText) {
  const file = inRoot('artifacts', `jest-${process.pid}.json`);
  fs.mkdirSync(inRoot('artifacts'), { recursive: true });
  fs.rmSync(file, { force: true });
  // with --json the report also goes to stdout, and what a person reads goes to stderr
  const child = spawn(
    process.execPath,
    ['node_modules/jest/bin/jest.js', '--ci', '--json', `--outputFile=${file}`, ...args],
    {
      cwd: root,
      stdio: ['ignore', 'ignore', 'pipe'],
    },
  );
  child.stderr.on('data', onText);
  // all tests are through, but one of them has left something open: say it, and do not wait for ever
  let throughSince;
  const watching = setInterval(() => {
    if (!fs.existsSync(file)) return;
    throughSince ??= Date.now();
    if (Date.now() - throughSince < graceMs) return;
    say(
      'a test has left something open, so jest did not end by itself: npx jest --detectOpenHandles shows what',
    );
    child.kill('SIGTERM');
    throughSince = Infinity;
  }, 1000);
  const done = new Promise((resolve) => {
    child.once('close', (code) => {
      clearInterval(watching);
      const { passed, failed, succeeded } = readReport(file);
      fs.rmSync(file, { force: true });
      const isGood = succeeded && (code === 0 || throughSince === Infinity);
      resolve({ passed, failed: isGood || failed > 0 ? failed : 1 });
    });
  });
  return { done, interrupt: () => child.kill('SIGTERM') };
}
