import { getTableColumns } from 'drizzle-orm';
import { z } from 'zod';
import * as api from '@/shared/schema/api';
import * as primitives from '@/shared/schema/primitives';
import * as records from '@/shared/schema/records';
import * as views from '@/shared/schema/views';
import * as protocol from '@/shared/sync/protocol';
import { syncTableNames, syncTables } from '@/shared/sync/syncTables';
import { syncedPgTables } from '@/db/server/schema/synced';
import { workingTables } from '@/db/device/schema/working';

const onServer = ['shopId', 'id', 'version', 'deleted', 'seq'];
const onDevice = ['id', 'version', 'deleted', 'mark'];

type Columns = Record<string, { notNull: boolean }>;

/** Fields of a table with whether they may be empty, without the columns that every table has. */
const fieldsOf = (columns: Columns, common: string[]) =>
  Object.entries(columns)
    .filter(([field]) => !common.includes(field))
    .map(([field, column]) => `${field}${column.notNull ? '' : '?'}`)
    .sort();

describe.each(syncTableNames)('%s', (table) => {
  const declared = Object.entries(syncTables[table].schema.shape)
    .map(([field, schema]) => `${field}${schema.safeParse(null).success ? '?' : ''}`)
    .sort();

  test('has the fields of its schema in PostgreSQL', () => {
    expect(fieldsOf(getTableColumns(syncedPgTables[table]), onServer)).toEqual(declared);
  });

  test('has the fields of its schema on the device', () => {
    expect(fieldsOf(getTableColumns(workingTables[table]), onDevice)).toEqual(declared);
  });

  test('names tables and fields that there are as its parent, references and fixed fields', () => {
    const { parent, references, fixed, schema } = syncTables[table];
    for (const link of [...(parent ? [parent] : []), ...references]) {
      expect(Object.keys(schema.shape)).toContain(link.field);
      expect(syncTableNames.indexOf(link.table)).toBeLessThan(syncTableNames.indexOf(table));
    }
    for (const field of fixed) expect(Object.keys(schema.shape)).toContain(field);
  });
});

/** Numbers that travel or are stored say what they are: a count, a place in an order, or one of the protocol's own. */
const numberName = /(Count|Ordinal|Version)$|^(n|sv|seq|version|cursor|last|limit|after|status)$/;

/** Names of all numeric properties in a JSON Schema. */
function numericNames(schema: unknown, name: string, found: Set<string>): Set<string> {
  if (typeof schema !== 'object' || schema === null) return found;
  const { type, properties, ...rest } = schema as Record<string, unknown>;
  if ([type].flat().some((one) => one === 'number' || one === 'integer')) found.add(name);
  for (const [property, inner] of Object.entries(properties ?? {})) numericNames(inner, property, found);
  for (const inner of Object.values(rest))
    for (const one of Array.isArray(inner) ? inner : [inner]) numericNames(one, name, found);
  return found;
}

test('every numeric field of every schema has a name that says what it counts', () => {
  const found = new Set<string>();
  for (const module of [api, primitives, records, views, protocol])
    for (const [name, schema] of Object.entries(module))
      if (schema instanceof z.ZodType)
        numericNames(z.toJSONSchema(schema, { io: 'output', unrepresentable: 'any' }), name, found);
  expect(found.size).toBeGreaterThan(10);
  expect([...found].filter((name) => !numberName.test(name))).toEqual([]);
});

test('the walk itself finds a number that does not say what it is', () => {
  const bad = z.toJSONSchema(z.object({ runs: z.array(z.object({ flow: z.number().nullable() })) }));
  expect([...numericNames(bad, 'bad', new Set())]).toEqual(['flow']);
});
