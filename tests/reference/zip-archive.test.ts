import { execFileSync, spawnSync } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import {
  createReadStream,
  createWriteStream,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { PassThrough, Readable, Writable } from 'node:stream';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import yauzl from 'yauzl';
import { planArchive, type ArchiveFile } from '../../api/features/archives/plan-archive.ts';
import { DamagedFile, writeArchive } from '../../api/features/archives/write-archive.ts';

let dir: string;
let file: string;
const DATE = new Date('2026-11-24T10:20:30Z');
const never = new AbortController().signal;
const sha256 = (bytes: Buffer | string) => createHash('sha256').update(bytes).digest('hex');

function fileOf(name: string, bytes: Buffer): ArchiveFile {
  return { name, size: bytes.length, sha256: sha256(bytes), date: DATE, open: async () => Readable.from([bytes], { objectMode: false }) };
}

const CONTENTS: [string, Buffer][] = [
  ['East front across the basin.jpg', randomBytes(70_000)],
  ['Brücke über den Fluß.tif', randomBytes(300_000)],
  ['日本の駅.jpg', randomBytes(1)],
  ['east front across the basin.JPG', randomBytes(5000)],
  ['../../evil.txt', Buffer.from('harmless')],
  ['SHA256SUMS.txt', Buffer.from('not the manifest')],
  ['back\\slash.jpg', Buffer.from('x')],
];
const NAMES = [
  'East front across the basin.jpg',
  'Brücke über den Fluß.tif',
  '日本の駅.jpg',
  'east front across the basin (2).JPG',
  'evil.txt',
  'SHA256SUMS (2).txt',
  'slash.jpg',
];
const FOLDER = 'Ropewalk Library – delivery 1';

beforeAll(async () => {
  dir = mkdtempSync(join(tmpdir(), 'archive-'));
  file = join(dir, 'a.zip');
  const plan = planArchive(
    FOLDER,
    CONTENTS.map(([name, bytes]) => fileOf(name, bytes)),
    DATE,
  );
  await writeArchive(plan, createWriteStream(file), never);
  expect(statSync(file).size).toBe(plan.length);
});
afterAll(() => rmSync(dir, { recursive: true }));

function expectTree(out: string) {
  expect(readdirSync(join(out, FOLDER)).sort()).toEqual([...NAMES, 'SHA256SUMS.txt'].sort());
  CONTENTS.forEach(([, bytes], index) => expect(sha256(readFileSync(join(out, FOLDER, NAMES[index] ?? '')))).toBe(sha256(bytes)));
  const checked = spawnSync('sha256sum', ['-c', '--strict', 'SHA256SUMS.txt'], { cwd: join(out, FOLDER), encoding: 'utf8' });
  expect(checked.status, checked.stdout + checked.stderr).toBe(0);
}

describe('an archive is opened and checked by', () => {
  const UTF8 = { ...process.env, LC_ALL: 'C.UTF-8' };
  it.each([
    ['unzip (Info-ZIP 6.0)', (out: string) => execFileSync('unzip', ['-q', file, '-d', out], { env: UTF8 })],
    ['7z (p7zip)', (out: string) => execFileSync('7z', ['x', '-y', `-o${out}`, file], { env: UTF8 })],
    ['bsdtar (libarchive)', (out: string) => execFileSync('bsdtar', ['-xf', file, '-C', out], { env: UTF8 })],
    ['Python’s zipfile', (out: string) => execFileSync('python3', ['-m', 'zipfile', '-e', file, out], { env: UTF8 })],
  ])('%s', (_name, extract) => {
    const out = mkdtempSync(join(dir, 'out-'));
    extract(out);
    expectTree(out);
  });

  it('the strict tests of unzip, 7z and Python', () => {
    expect(spawnSync('unzip', ['-tqq', file]).status).toBe(0);
    expect(spawnSync('7z', ['t', file]).status).toBe(0);
    const bad = execFileSync('python3', ['-c', `import zipfile,sys; print(zipfile.ZipFile(sys.argv[1]).testzip())`, file], {
      encoding: 'utf8',
    });
    expect(bad.trim()).toBe('None');
  });

  it('yauzl, which finds every entry stored and every name valid', async () => {
    const zip = await promisify<string, yauzl.Options, yauzl.ZipFile>(yauzl.open)(file, { lazyEntries: false, strictFileNames: true });
    const entries: yauzl.Entry[] = [];
    zip.on('entry', (entry: yauzl.Entry) => entries.push(entry));
    await new Promise((resolve, reject) => zip.once('end', resolve).once('error', reject));
    expect(entries.map((entry) => entry.fileName)).toEqual([...NAMES, 'SHA256SUMS.txt'].map((name) => `${FOLDER}/${name}`));
    for (const entry of entries) {
      expect(entry.compressionMethod).toBe(0);
      expect(yauzl.validateFileName(entry.fileName)).toBeNull();
      expect(entry.getLastModDate({ timezone: 'UTC' } as never).toISOString()).toBe('2026-11-24T10:20:30.000Z');
    }
  });
});

describe('the same rows give the same archive', () => {
  it('byte for byte', async () => {
    const again = join(dir, 'again.zip');
    const plan = planArchive(
      FOLDER,
      CONTENTS.map(([name, bytes]) => fileOf(name, bytes)),
      DATE,
    );
    await writeArchive(plan, createWriteStream(again), never);
    expect(sha256(readFileSync(again))).toBe(sha256(readFileSync(file)));
  });
});

describe('an empty archive', () => {
  it('holds only the list of checksums', async () => {
    const empty = join(dir, 'empty.zip');
    const plan = planArchive('', [], DATE);
    await writeArchive(plan, createWriteStream(empty), never);
    expect(statSync(empty).size).toBe(plan.length);
    expect(execFileSync('bsdtar', ['-tf', empty], { encoding: 'utf8' }).trim()).toBe('pictures/SHA256SUMS.txt');
  });
});

describe('beyond 4 GiB', () => {
  // A sparse source: zeros are made up as they are read, and the archive is counted and dropped but for its last megabyte.
  it('is as long as planned, and its directory leads to the last file', async () => {
    const size = 4 * 2 ** 30 + 1;
    const block = Buffer.alloc(4 * 2 ** 20);
    const big: ArchiveFile = {
      name: 'big.bin',
      size,
      // coreutils: head -c 4294967297 /dev/zero | sha256sum
      sha256: 'fbb82f7b353676bb562eb82157fcf0ea42c36492ca13ee56dbf82c08b6802c5c',
      date: DATE,
      open: async () =>
        Readable.from(
          (function* () {
            for (let left = size; left > 0; left -= block.length) yield left < block.length ? block.subarray(0, left) : block;
          })(),
          { objectMode: false },
        ),
    };
    const plan = planArchive('large', [big, fileOf('after.txt', Buffer.from('abc'))], DATE);
    const sparse = join(dir, 'large.zip');
    execFileSync('truncate', ['-s', '0', sparse]);
    const { open } = await import('node:fs/promises');
    const handle = await open(sparse, 'r+');
    let written = 0;
    const output = new Writable({
      write(chunk: Buffer, _encoding, done) {
        const at = written;
        written += chunk.length;
        if (chunk.length === block.length && chunk.equals(block)) done();
        else handle.write(chunk, 0, chunk.length, at).then(() => done(), done);
      },
    });
    await writeArchive(plan, output, never);
    await handle.close();
    expect(written).toBe(plan.length);
    expect(statSync(sparse).size).toBe(plan.length);
    const out = join(dir, 'large');
    mkdirSync(out);
    execFileSync('unzip', ['-q', sparse, 'large/after.txt', '-d', out]);
    expect(readFileSync(join(out, 'large/after.txt'), 'utf8')).toBe('abc');
    expect(
      execFileSync(
        'python3',
        ['-c', `import zipfile,sys; print([i.file_size for i in zipfile.ZipFile(sys.argv[1]).infolist()][:2])`, sparse],
        { encoding: 'utf8' },
      ).trim(),
    ).toBe(`[${size}, 3]`);
    expect(execFileSync('7z', ['l', sparse], { encoding: 'utf8' })).toContain(String(size));
    rmSync(sparse);
  }, 120_000);
});

describe('a failure ends the archive, not the process, and hangs nothing', () => {
  const good = () => fileOf('good.jpg', randomBytes(100_000));
  const failing = (open: ArchiveFile['open']): ArchiveFile => ({ ...fileOf('bad.jpg', randomBytes(100_000)), open });
  const run = (files: ArchiveFile[], output: Writable = new PassThrough().resume(), signal = never) =>
    writeArchive(planArchive('x', files, DATE), output, signal);

  it('when a source cannot be opened', async () => {
    const bad = failing(async () => Promise.reject(new Error('the store is away')));
    await expect(run([good(), bad, good()])).rejects.toThrow('the store is away');
  });

  it('when a source errors in the middle', async () => {
    const bad = failing(async () => {
      const source = new PassThrough();
      source.write(Buffer.alloc(1000));
      setTimeout(() => source.destroy(new Error('line lost')), 20);
      return source;
    });
    await expect(run([good(), bad])).rejects.toThrow('line lost');
  });

  it('when a source is destroyed silently', async () => {
    const bad = failing(async () => {
      const source = new PassThrough();
      source.write(Buffer.alloc(1000));
      setTimeout(() => source.destroy(), 20);
      return source;
    });
    await expect(run([good(), bad])).rejects.toThrow();
  });

  it.each([
    ['ends early', Buffer.alloc(10)],
    ['has more bytes', Buffer.alloc(200_000)],
    ['has other bytes', Buffer.alloc(100_000)],
  ])('when a source %s', async (_name, bytes) => {
    const bad = failing(async () => Readable.from([bytes], { objectMode: false }));
    await expect(run([bad])).rejects.toThrow(DamagedFile);
  });

  it('when the output errors, while a source waits', async () => {
    const output = new Writable({ write: (_chunk, _encoding, done) => done(new Error('disk full')) });
    await expect(run([good(), good()], output)).rejects.toThrow('disk full');
  });

  it('when the output is destroyed silently', async () => {
    const output = new PassThrough();
    setTimeout(() => output.destroy(), 20);
    const stalls = failing(async () => new PassThrough());
    await expect(run([stalls], output)).rejects.toThrow();
  });

  it('when it is broken off while a source stalls', async () => {
    const stop = new AbortController();
    let source: PassThrough | undefined;
    const stalls = failing(async () => (source = new PassThrough()));
    const running = run([stalls], undefined, stop.signal);
    setTimeout(() => stop.abort(new Error('the worker is stopping')), 20);
    await expect(running).rejects.toThrow('the worker is stopping');
    expect(source?.destroyed).toBe(true);
  });

  it('opens no source before the one in front of it is through', async () => {
    let open = 0;
    let most = 0;
    const counted = Array.from({ length: 20 }, (_, i) => {
      const bytes = randomBytes(50_000);
      const path = join(dir, `source-${i}`);
      writeFileSync(path, bytes);
      return {
        ...fileOf(`${i}.jpg`, bytes),
        open: async () => {
          most = Math.max(most, ++open);
          return createReadStream(path).once('close', () => open--);
        },
      };
    });
    await run(counted);
    expect(most).toBe(1);
  });
});
