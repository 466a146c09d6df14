/** Stops and removes the cluster of globalSetup.mjs. */
export default async function globalTeardown() {
  globalThis.discardTestCluster?.();
}
