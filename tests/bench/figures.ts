/** Median of some numbers. */
export function median(values: readonly number[]): number {
  return quantile(values, 0.5);
}

/** The value below which a share of the numbers lies. @param share 0..1 */
export function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const value = sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))];
  if (value === undefined) throw new RangeError('no figures');
  return value;
}

/** Milliseconds that some work takes. */
export async function timed(work: () => unknown): Promise<number> {
  const begin = performance.now();
  await work();
  return performance.now() - begin;
}

/** One line of the benchmark: a ratio against its baseline in the same run, and what is aimed at. */
export function line(name: string, ratio: number, aim: string, detail: string): void {
  console.log(`${name.padEnd(52)} ${ratio.toFixed(2).padStart(7)}   ${aim.padEnd(14)} ${detail}`);
}
