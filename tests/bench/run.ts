import { startTestCluster } from '../factories/testCluster.mjs';
import { coldStartBench } from './coldStartBench';
import { pushBench } from './pushBench';
import { saveBench } from './saveBench';
import { sizeBench } from './sizeBench';

/* npm run bench [name …]: speed as ratios, each against its baseline in the same run on the same machine. */

const benches: Record<string, () => Promise<void>> = {
  save: saveBench,
  size: sizeBench,
  coldStart: coldStartBench,
  push: pushBench,
};

async function main(): Promise<void> {
  const wanted = process.argv.slice(2);
  const unknown = wanted.find((name) => !(name in benches));
  if (unknown !== undefined)
    throw new Error(`no benchmark "${unknown}"; there are ${Object.keys(benches).join(', ')}`);
  // PostgreSQL as it is by default: a commit is on disk when it is answered
  const discard = await startTestCluster();
  try {
    for (const [name, bench] of Object.entries(benches))
      if (wanted.length === 0 || wanted.includes(name)) await bench();
  } finally {
    discard();
  }
}

main().catch((error: unknown) => {
  console.error(error);
  process.exitCode = 1;
});
