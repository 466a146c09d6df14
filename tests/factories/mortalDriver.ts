import type { DeviceDriver } from '@/db/device/driver';

export type MortalDriver = DeviceDriver & {
  /** the call after so many more never comes back, and none after it; every other time it was done but not answered */
  dieAt: (callsFromNow: number) => void;
  callCount: () => number;
};

/** A driver that dies as a browser is killed: in the middle, without a word. */
export function mortal(driver: DeviceDriver): MortalDriver {
  let left = Infinity;
  let count = 0;
  const guard =
    <A extends unknown[], R>(call: (...args: A) => Promise<R>) =>
    async (...args: A): Promise<R> => {
      count += 1;
      left -= 1;
      if (left < 0) throw new Error('killed');
      const result = await call(...args);
      // done, but nobody heard of it
      if (left === 0) throw new Error('killed');
      return result;
    };
  return {
    exec: guard(driver.exec),
    all: guard(driver.all),
    run: guard(driver.run),
    close: driver.close,
    dieAt: (callsFromNow) => {
      left = callsFromNow;
    },
    callCount: () => count,
  };
}
