import pg from 'pg';

/** PostgreSQL could not be reached, or the connection broke: nothing was committed that was not answered. */
export class DatabaseUnavailable extends Error {
  constructor(cause: unknown) {
    super('the database cannot be reached', { cause });
    this.name = 'DatabaseUnavailable';
  }
}

/** The error PostgreSQL itself reported, also when Drizzle has wrapped it; null when it is something else. */
export function databaseErrorOf(error: unknown): pg.DatabaseError | null {
  for (let current: unknown = error, depth = 0; current instanceof Error && depth < 5; depth += 1) {
    if (current instanceof pg.DatabaseError) return current;
    current = current.cause;
  }
  return null;
}

/** Classes and codes of trouble that passes: connection, resources, locks, timeouts, a server going down. */
const passing = /^(08|53|40|55P03|57P0|57014|25P03)/;

/** True when the same request may succeed a little later. */
export function isPassingTrouble(error: unknown): boolean {
  if (error instanceof DatabaseUnavailable) return true;
  return passing.test(databaseErrorOf(error)?.code ?? '');
}

/** True when PostgreSQL refused a value: data exceptions, broken constraints, and limits of what it can store. */
export function isRefusedValue(error: unknown): boolean {
  return /^(22|23|54)/.test(databaseErrorOf(error)?.code ?? '');
}
