/** The oldest schema version whose app can still read the feed. */
export const oldestSchemaVersion = 1;
