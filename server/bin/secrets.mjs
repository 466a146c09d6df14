// The passwords of the three roles and the key that signs sign-ins, made once, kept in the data folder, readable by
// this user only. Node built-ins only.
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';

const names = ['adminPassword', 'ownerPassword', 'appPassword', 'jwtSecret'];

/** Reads the secrets of a data folder; makes those that are missing. */
export function readSecrets(folder) {
  const file = path.join(folder, 'secrets.json');
  const known = fs.existsSync(file) ? JSON.parse(fs.readFileSync(file, 'utf8')) : {};
  const secrets = Object.fromEntries(
    names.map((name) => [name, known[name] ?? randomBytes(32).toString('base64url')]),
  );
  if (names.some((name) => !known[name])) {
    fs.mkdirSync(folder, { recursive: true });
    // written beside and renamed, so that a crash leaves the old file or the new one
    fs.writeFileSync(`${file}.new`, `${JSON.stringify({ ...known, ...secrets }, null, 2)}\n`, {
      mode: 0o600,
    });
    fs.renameSync(`${file}.new`, file);
  }
  fs.chmodSync(file, 0o600);
  return secrets;
}
