// What the web build is made of, as one number: when it changes, the build is stale. Node built-ins only.
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { root } from './paths.mjs';

const webSources = [
  'app',
  'components',
  'stores',
  'shared',
  'db/device',
  'drizzle/device',
  'assets',
  'public',
  'app.json',
  'babel.config.js',
  'metro.config.js',
  'package-lock.json',
  'tsconfig.json',
  'server/bin/webBuild.mjs',
  'server/bin/serviceWorker.mjs',
];

/** Hash over names and contents of files; generated ones follow from the others and are left out. */
export function sourceHash(base = root, sources = webSources) {
  const hash = createHash('sha256');
  const walk = (name) => {
    const full = path.join(base, name);
    if (!fs.existsSync(full)) return;
    if (fs.statSync(full).isDirectory()) {
      for (const entry of fs.readdirSync(full).sort()) walk(`${name}/${entry}`);
    } else if (!name.endsWith('.gen.ts')) {
      const content = fs.readFileSync(full);
      hash.update(`${name}\0${content.length}\0`).update(content);
    }
  };
  sources.forEach(walk);
  return hash.digest('hex');
}
