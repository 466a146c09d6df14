/** Makes `work` run once at a time. Calls that come while it runs are answered by one more run afterwards, however many
 * they were: nothing is missed and a flood of calls never starves the work.
 */
export function coalesce(work: () => Promise<unknown>): () => void {
  let isRunning = false;
  let isAskedAgain = false;
  const run = async () => {
    isRunning = true;
    do {
      isAskedAgain = false;
      // a failed look shows on its own screen
      await work().catch(() => undefined);
    } while (isAskedAgain);
    isRunning = false;
  };
  return () => {
    isAskedAgain = true;
    if (!isRunning) void run();
  };
}
