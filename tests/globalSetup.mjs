// One throwaway PostgreSQL cluster for all projects that need one. No top-level await: jest loads this with require().
import { writeGenerated } from '../server/bin/generated.mjs';
import { startTestCluster } from './factories/testCluster.mjs';

const fast = { fsync: 'off', synchronous_commit: 'off', full_page_writes: 'off', shared_buffers: '64MB' };

/** Starts the cluster and says where it is. jest skips globalTeardown when it is interrupted: the cluster goes anyway. */
export default async function globalSetup() {
  if (globalThis.discardTestCluster) return; // another project of this run has been here
  globalThis.discardTestCluster = () => undefined;
  writeGenerated();
  globalThis.discardTestCluster = await startTestCluster(fast);
}
