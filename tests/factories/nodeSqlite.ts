import fs from 'node:fs';
import path from 'node:path';
import { TextDecoder as NodeTextDecoder } from 'node:util';
import type { DeviceDriver } from '@/db/device/driver';

/* The very SQLite build the web app runs (wa-sqlite.wasm of expo-sqlite) under Node, on files in memory. The files
 * outlive a connection: a connection that is simply dropped is a killed browser, and opening again recovers from the
 * bytes that were written until then. */

const folder = path.resolve(__dirname, '../../node_modules/expo-sqlite/web/wa-sqlite');
const rowReady = 100;

type Api = {
  vfs_register: (vfs: unknown, isDefault: boolean) => void;
  open_v2: (name: string) => Promise<number>;
  close: (db: number) => Promise<number>;
  exec: (db: number, sql: string) => Promise<number>;
  statements: (db: number, sql: string) => AsyncIterable<number>;
  bind: (statement: number, index: number, value: unknown) => void;
  step: (statement: number) => Promise<number>;
  row: (statement: number) => unknown[];
};

type MemoryFile = { pathname: string; flags: number; size: number; data: ArrayBuffer };
type MemoryFiles = {
  mapNameToFile: Map<string, MemoryFile>;
  jWrite: (fileId: number, data: Uint8Array, offset: number) => number;
};

let ready: Promise<{ api: Api; files: MemoryFiles }> | undefined;
let fileCount = 0;

async function load(): Promise<{ api: Api; files: MemoryFiles }> {
  // the TextDecoder that jest-expo installs knows UTF-8 only
  Object.defineProperty(globalThis, 'TextDecoder', {
    value: NodeTextDecoder,
    configurable: true,
    writable: true,
  });
  type Wasm = object;
  const part = <T extends object>(file: string): T => jest.requireActual<T>(path.join(folder, file));
  const { default: makeModule } = part<{ default: (options: { wasmBinary: Buffer }) => Promise<Wasm> }>(
    'wa-sqlite.js',
  );
  const sqlite = part<{ Factory: (wasm: Wasm) => Api }>('sqlite-api.js');
  const { MemoryVFS } = part<{ MemoryVFS: { create: (name: string, wasm: Wasm) => Promise<MemoryFiles> } }>(
    'MemoryVFS.js',
  );
  const wasm = await makeModule({ wasmBinary: fs.readFileSync(path.join(folder, 'wa-sqlite.wasm')) });
  const api = sqlite.Factory(wasm);
  const files = await MemoryVFS.create('mem', wasm);
  // the bytes come behind a proxy, through which copying them one by one takes a hundred times longer
  const write = files.jWrite.bind(files);
  files.jWrite = (fileId, data, offset) => write(fileId, data.subarray(), offset);
  api.vfs_register(files, true);
  return { api, files };
}

/** A name for a database file that no test has used. */
export const freshFile = (): string => `device${++fileCount}.db`;

/** Opens a database file; the same name opens the same bytes again. */
export async function openNodeSqlite(file: string): Promise<DeviceDriver> {
  const { api } = await (ready ??= load());
  const db = await api.open_v2(file);
  async function all(sql: string, params: unknown[]): Promise<unknown[][]> {
    const rows: unknown[][] = [];
    for await (const statement of api.statements(db, sql)) {
      params.forEach((value, index) =>
        api.bind(statement, index + 1, typeof value === 'boolean' ? Number(value) : value),
      );
      while ((await api.step(statement)) === rowReady) rows.push(api.row(statement));
    }
    return rows;
  }
  return {
    exec: async (sql) => void (await api.exec(db, sql)),
    all,
    run: async (sql, params) => void (await all(sql, params)),
    close: async () => void (await api.close(db)),
  };
}

/** Copies a database as it lies there at this moment, its write-ahead log too: a disk image, a killed browser's files.
 * @returns name of the copy */
export async function copyFiles(from: string): Promise<string> {
  const { files } = await (ready ??= load());
  const to = freshFile();
  for (const suffix of ['', '-wal', '-journal']) {
    const file = files.mapNameToFile.get(`/${from}${suffix}`);
    if (!file) continue;
    const pathname = `/${to}${suffix}`;
    files.mapNameToFile.set(pathname, { ...file, pathname, data: file.data.slice(0) });
  }
  return to;
}
