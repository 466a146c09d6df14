import { spawn } from 'node:child_process';
import fs from 'node:fs';
import net, { type AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { arePackagesFresh, checkNode, checkRoom, wantedPort } from '@/server/bin/machine.mjs';
import { giveFile, takeFile } from '@/server/bin/oneAtATime.mjs';
import { readSecrets } from '@/server/bin/secrets.mjs';
import { sourceHash } from '@/server/bin/sourceHash.mjs';

const root = path.resolve(__dirname, '../..');
let folder: string;

beforeEach(() => {
  folder = fs.mkdtempSync(path.join(os.tmpdir(), 'inchwater-setup-'));
});

afterEach(() => fs.rmSync(folder, { recursive: true, force: true }));

/** npm start as a person runs it, until it ends. */
function runStart(env: Record<string, string>): Promise<{ code: number | null; said: string }> {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, ['server/bin/start.mjs'], {
      cwd: root,
      env: { ...process.env, INCHWATER_DATA: folder, ...env },
    });
    let said = '';
    child.stdout.on('data', (chunk: Buffer) => (said += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (said += chunk.toString()));
    child.once('close', (code) => resolve({ code, said }));
  });
}

describe('npm start', () => {
  test('refuses a taken port with a sentence, before it has made anything', async () => {
    const other = net.createServer();
    await new Promise<void>((resolve) => other.listen(0, '127.0.0.1', resolve));
    const { port } = other.address() as AddressInfo;
    const { code, said } = await runStart({ PORT: String(port) });
    await new Promise((resolve) => other.close(resolve));
    expect(code).toBe(1);
    expect(said).toContain(`Port ${port} on 127.0.0.1 is taken`);
    expect(said).toMatch(/PORT=\d+ npm start/);
    expect(said).not.toMatch(/\n\s+at /);
    expect(fs.readdirSync(folder)).toEqual([]);
  });

  test('refuses a data folder that a living process uses, and says which process', async () => {
    expect(takeFile(path.join(folder, 'in-use'))).toBeNull();
    const { code, said } = await runStart({ PORT: String(await freePort()) });
    expect(code).toBe(1);
    expect(said).toContain(`already runs with the data folder ${folder} (process ${process.pid})`);
    expect(fs.readdirSync(folder)).toEqual(['in-use']);
  });

  test('refuses a port that is no port', async () => {
    const { code, said } = await runStart({ PORT: '30x0' });
    expect(code).toBe(1);
    expect(said).toContain('PORT is "30x0"');
  });
});

function freePort(): Promise<number> {
  return new Promise((resolve) => {
    const probe = net.createServer();
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address() as AddressInfo;
      probe.close(() => resolve(port));
    });
  });
}

describe('the hash of the sources', () => {
  const hash = () => sourceHash(folder, ['app', 'one.json', 'not-there']);

  beforeEach(() => {
    fs.mkdirSync(path.join(folder, 'app/inner'), { recursive: true });
    fs.writeFileSync(path.join(folder, 'app/inner/a.ts'), 'a');
    fs.writeFileSync(path.join(folder, 'one.json'), '1');
  });

  test('stays when nothing changed', () => expect(hash()).toBe(hash()));

  test('changes with a content, a name, and a new file', () => {
    const seen = new Set([hash()]);
    fs.writeFileSync(path.join(folder, 'app/inner/a.ts'), 'b');
    seen.add(hash());
    fs.renameSync(path.join(folder, 'app/inner/a.ts'), path.join(folder, 'app/inner/b.ts'));
    seen.add(hash());
    fs.writeFileSync(path.join(folder, 'app/c.ts'), '');
    seen.add(hash());
    expect(seen.size).toBe(4);
  });

  test('is blind to generated files, which follow from the others', () => {
    const before = hash();
    fs.writeFileSync(path.join(folder, 'app/build.gen.ts'), 'x');
    expect(hash()).toBe(before);
  });
});

describe('secrets', () => {
  test('are made once, all different, readable by this user only', () => {
    const first = readSecrets(folder);
    const { adminPassword, ownerPassword, appPassword, jwtSecret } = first;
    expect(new Set([adminPassword, ownerPassword, appPassword, jwtSecret]).size).toBe(4);
    expect(Math.min(...Object.values(first).map((one) => one.length))).toBeGreaterThanOrEqual(43);
    expect(fs.statSync(path.join(folder, 'secrets.json')).mode & 0o777).toBe(0o600);
    expect(readSecrets(folder)).toEqual(first);
  });

  test('keep what is there when a new one is added', () => {
    fs.writeFileSync(
      path.join(folder, 'secrets.json'),
      JSON.stringify({ appPassword: 'kept', later: 'kept too' }),
    );
    expect(readSecrets(folder).appPassword).toBe('kept');
    const file = JSON.parse(fs.readFileSync(path.join(folder, 'secrets.json'), 'utf8'));
    expect(file).toMatchObject({ appPassword: 'kept', later: 'kept too' });
  });
});

describe('a file that says who is at work', () => {
  const file = () => path.join(folder, 'lock');

  test('is refused while its process lives, and taken over when it is gone', async () => {
    const holder = spawn(process.execPath, [
      '--input-type=module',
      '-e',
      `import { takeFile } from ${JSON.stringify(path.join(root, 'server/bin/oneAtATime.mjs'))};
       takeFile(${JSON.stringify(file())}); console.log('taken'); setInterval(() => {}, 1000);`,
    ]);
    await new Promise((resolve) => holder.stdout.once('data', resolve));
    expect(takeFile(file())).toBe(holder.pid);
    const gone = new Promise((resolve) => holder.once('exit', resolve));
    holder.kill('SIGKILL');
    await gone;
    expect(takeFile(file())).toBeNull();
    giveFile(file());
    expect(fs.existsSync(file())).toBe(false);
  });

  test('of a process whose number now belongs to another one is taken over', () => {
    fs.writeFileSync(file(), `${process.ppid} 1`);
    expect(takeFile(file())).toBeNull();
  });
});

describe('the machine', () => {
  test('needs Node 20.19 or newer', () => {
    for (const good of ['20.19.0', '20.20.2', '22.0.0']) expect(() => checkNode(good)).not.toThrow();
    for (const old of ['20.18.3', '18.20.0', '9.0.0']) expect(() => checkNode(old)).toThrow(`this is ${old}`);
  });

  test('needs room on the disk, and says how much', () => {
    expect(() => checkRoom(folder, 1)).not.toThrow();
    expect(() => checkRoom(folder, 1e12)).toThrow(/Only \d+ MB are free in .*1000000000000 MB are needed/);
  });

  test('takes a port from 1 to 65535', () => {
    expect(wantedPort('8080')).toBe(8080);
    for (const wrong of ['0', '65536', '-1', '3000.5', ' 80', 'web'])
      expect(() => wantedPort(wrong)).toThrow('PORT is');
  });

  test('has fresh packages when every needed one is there in the version of the lock', () => {
    const lock = {
      packages: {
        '': {},
        'node_modules/a': { version: '1.0.0' },
        'node_modules/b': { version: '2.0.0', optional: true },
      },
    };
    const installed = (version: string) => ({ packages: { 'node_modules/a': { version } } });
    expect(arePackagesFresh(lock, installed('1.0.0'))).toBe(true);
    expect(arePackagesFresh(lock, installed('1.0.1'))).toBe(false);
    expect(arePackagesFresh(lock, { packages: {} })).toBe(false);
    expect(arePackagesFresh(lock, null)).toBe(false);
  });
});
