import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { sha256Manifest } from '../../api/domain/manifest.ts';

let dir: string;
beforeAll(() => {
  dir = mkdtempSync(join(tmpdir(), 'manifest-'));
});
afterAll(() => rmSync(dir, { recursive: true }));

const sha256 = (text: string) => createHash('sha256').update(text).digest('hex');

// FIPS 180-2's vectors for "abc" and the empty message.
it('hashes as published', () => {
  expect(sha256('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad');
  expect(sha256('')).toBe('e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855');
});

it('is the very list GNU sha256sum writes, and passes sha256sum -c', () => {
  const files = ['a.jpg', 'ü und ß.jpg', 'two  spaces.jpg', 'back\\slash.jpg', 'new\nline.jpg', ' leading.jpg'];
  for (const name of files) writeFileSync(join(dir, name), `content of ${name}`);
  const ours = sha256Manifest(files.map((name) => ({ name, sha256: sha256(`content of ${name}`) })));
  expect(ours).toBe(execFileSync('sha256sum', ['--', ...files], { cwd: dir, encoding: 'utf8' }));
  writeFileSync(join(dir, 'SHA256SUMS'), ours);
  const checked = execFileSync('sha256sum', ['-c', '--strict', 'SHA256SUMS'], {
    cwd: dir,
    encoding: 'utf8',
    env: { ...process.env, LC_ALL: 'C' },
  });
  expect(checked.trim().split('\n')).toHaveLength(files.length);
});

it('refuses what is no hash', () => {
  expect(() => sha256Manifest([{ name: 'a', sha256: 'ABC' }])).toThrow(RangeError);
});
