// npm test: does its own set-up, runs every test, ends with one line "N passed, N failed". Extra arguments go to jest:
// npm test -- tests/shared. Node built-ins only.
import { writeGenerated } from './generated.mjs';
import {
  checkNode,
  checkRoom,
  chromium,
  ensureDebianPackages,
  ensurePackages,
  postgresql,
} from './machine.mjs';
import { root } from './paths.mjs';
import { runJest } from './runJest.mjs';
import { explain, numberedSteps, say, stopChildren } from './steps.mjs';
import { ensureWeb } from './webBuild.mjs';

let interrupt = () => process.exit(1);

async function main() {
  checkNode();
  checkRoom(root, 300);
  const step = numberedSteps(4);
  await step('npm packages', ensurePackages);
  await step('Debian packages', () => ensureDebianPackages(postgresql, chromium));
  writeGenerated();
  await step('web app', ensureWeb);
  say('4/4 tests');
  const jest = runJest(process.argv.slice(2), (text) => process.stderr.write(text));
  interrupt = jest.interrupt;
  return jest.done;
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(signal, () => {
    stopChildren();
    interrupt();
  });
}

main()
  .catch((error) => {
    explain(error);
    return { passed: 0, failed: 1 };
  })
  .then(({ passed, failed }) => {
    process.exitCode = failed > 0 ? 1 : 0;
    console.log(`${passed} passed, ${failed} failed`);
  });
