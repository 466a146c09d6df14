// npm run check: the house rules, cheapest first. Node built-ins only.
import { writeGenerated } from './generated.mjs';
import { needsPackages } from './machine.mjs';
import { runJest } from './runJest.mjs';
import { explain, numberedSteps, Obstacle, run, stopChildren } from './steps.mjs';

let interrupt = () => undefined;

const node = (program, ...args) => run(process.execPath, [`node_modules/${program}`, ...args]);
const folders = ['app', 'components', 'stores', 'server', 'shared', 'db', 'tests'];

async function fastTests() {
  let said = '';
  const jest = runJest(['--selectProjects', 'node', 'server', 'web'], (text) => (said += text));
  interrupt = jest.interrupt;
  const { failed } = await jest.done;
  if (failed > 0) throw new Obstacle(said.trim());
}

const rules = [
  ['format', () => node('prettier/bin/prettier.cjs', '--check', '.')],
  ['lint', () => node('eslint/bin/eslint.js', '.', '--max-warnings', '0')],
  ['types', () => node('typescript/bin/tsc', '--noEmit')],
  ['import directions', () => node('dependency-cruiser/bin/dependency-cruise.mjs', ...folders)],
  ['unused code', () => node('knip/bin/knip.js', '--no-config-hints')],
  ['migrations', () => run(process.execPath, ['server/bin/dbGenerate.mjs', '--check'])],
  ['fast tests', fastTests],
];

async function main() {
  if (needsPackages()) throw new Obstacle('The packages are not those of package-lock.json. Run: npm ci');
  writeGenerated();
  const step = numberedSteps(rules.length);
  const broken = [];
  for (const [name, rule] of rules) {
    // all rules are tried, so that one look shows everything there is to mend
    await step(name, rule).catch((error) => broken.push(`--- ${name}\n${error.message}`));
  }
  if (broken.length > 0)
    throw new Obstacle(`${broken.length} of ${rules.length} not kept:\n${broken.join('\n')}`);
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.on(signal, () => {
    stopChildren();
    interrupt();
    process.exit(1);
  });
}

main().catch((error) => {
  explain(error);
  process.exitCode = 1;
});
