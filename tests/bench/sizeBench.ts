import fs from 'node:fs';
import path from 'node:path';
import zlib from 'node:zlib';
import { dist } from '@/server/bin/paths.mjs';
import { line } from './figures';

/** Kilobytes, gzip, of a bare app of the same parts (router, SQLite, query, Drizzle) without any product, measured once
 * with the versions that are pinned. */
const bareAppKb = 417;

const under = (folder: string): string[] =>
  fs
    .readdirSync(folder, { withFileTypes: true })
    .flatMap((entry) =>
      entry.isDirectory() ? under(path.join(folder, entry.name)) : [path.join(folder, entry.name)],
    );

/** What the web app weighs, all routes together, against the bare app. */
export async function sizeBench(): Promise<void> {
  const scripts = under(path.join(dist, '_expo')).filter((file) => file.endsWith('.js'));
  const kb = (compress: (bytes: Buffer) => Buffer) =>
    scripts.reduce((sum, file) => sum + compress(fs.readFileSync(file)).length, 0) / 1024;
  const gzip = kb((bytes) => zlib.gzipSync(bytes, { level: 9 }));
  const brotli = kb((bytes) => zlib.brotliCompressSync(bytes));
  line(
    'JavaScript of all routes against the bare app, gzip',
    gzip / bareAppKb,
    '',
    `${gzip.toFixed(0)} KiB gzip, ${brotli.toFixed(0)} KiB brotli, ${scripts.length} files`,
  );
}
