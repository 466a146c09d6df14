/** Outside a browser there are no tabs: the database is always ours. */
export function takeTabLock(): Promise<boolean> {
  return Promise.resolve(true);
}

/** Resolves when the other tab has gone or has handed the database over. */
export function waitForTabLock(): Promise<void> {
  return Promise.resolve();
}

/** Asks the tab that has the database to hand it over. */
export function askForTabLock(): void {
  // nobody to ask
}

/** Says what the owner does before it lets go: finish what is being written. */
export function beforeHandOver(_flush: () => Promise<void>): void {
  // never asked
}
