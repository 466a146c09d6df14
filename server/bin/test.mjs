// npm test: does its own set-up, runs every test, ends with one line "N passed, N failed". Extra arguments go to jest:
// npm test -- tests/shared. Node built-ins only.
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import { writeGenerated } from './generated.mjs';
import {
  checkNode,
  checkRoom,
  chromium,
  ensureDebianPackages,
  ensurePackages,
  postgresql,
} from './machine.mjs';
import { inRoot, root } from './paths.mjs';
import { explain, numberedSteps, say, stopChildren } from './steps.mjs';
import { ensureWeb } from './webBuild.mjs';

const resultFile = inRoot('artifacts', `jest-${process.pid}.json`);
let jest;

/** Counts of jest's own report; a file that could not run is a failure. */
function readTotals() {
  if (!fs.existsSync(resultFile)) return { passed: 0, failed: 1 };
  const report = JSON.parse(fs.readFileSync(resultFile, 'utf8'));
  fs.rmSync(resultFile);
  return { passed: report.numPassedTests, failed: report.numFailedTests + report.numRuntimeErrorTestSuites };
}

function runJest() {
  fs.mkdirSync(inRoot('artifacts'), { recursive: true });
  const args = ['--ci', '--json', `--outputFile=${resultFile}`, ...process.argv.slice(2)];
  return new Promise((resolve) => {
    // with --json the report also goes to stdout, and what a person reads goes to stderr
    jest = spawn(process.execPath, ['node_modules/jest/bin/jest.js', ...args], {
      cwd: root,
      stdio: ['ignore', 'ignore', 'inherit'],
    });
    jest.once('exit', (code, signal) => resolve(code ?? (signal ? 1 : 0)));
  });
}

async function main() {
  checkNode();
  checkRoom(root, 300);
  const step = numberedSteps(4);
  await step('npm packages', ensurePackages);
  await step('Debian packages', () => ensureDebianPackages(postgresql, chromium));
  writeGenerated();
  await step('web app', ensureWeb);
  say('4/4 tests');
  return runJest();
}

for (const signal of ['SIGINT', 'SIGTERM']) {
  process.on(signal, () => {
    stopChildren();
    if (jest) jest.kill('SIGTERM');
    else process.exit(1);
  });
}

main()
  .catch((error) => {
    explain(error);
    return 1;
  })
  .then((code) => {
    const { passed, failed } = readTotals();
    console.log(`${passed} passed, ${failed === 0 && code !== 0 ? 1 : failed} failed`);
    process.exitCode = code !== 0 || failed > 0 ? 1 : 0;
  });
