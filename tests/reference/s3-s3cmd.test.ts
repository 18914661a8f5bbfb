import { execFile } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type OwnStore, startOwnStore } from '../docker-free-dev/own-store.ts';
import { KEYS } from '../docker-free-dev/signed-request.ts';

/** The store through s3cmd (Debian package s3cmd), a client with a signer and a listing of its own. */
let own: OwnStore;
let dir: string;
const MIB = 1024 * 1024;

async function s3cmd(...args: string[]): Promise<string> {
  const { stdout } = await promisify(execFile)('s3cmd', ['--config', path.join(dir, 's3cfg'), '--no-progress', ...args]);
  return stdout;
}

beforeAll(async () => {
  own = await startOwnStore();
  dir = mkdtempSync(path.join(tmpdir(), 'oriel-s3cmd-'));
  const host = `127.0.0.1:${own.store.port}`;
  const lines = [
    '[default]',
    `access_key = ${KEYS.accessKeyId}`,
    `secret_key = ${KEYS.secretAccessKey}`,
    `host_base = ${host}`,
    `host_bucket = ${host}`,
    'use_https = False',
    'signature_v2 = False',
  ];
  writeFileSync(path.join(dir, 's3cfg'), lines.join('\n'));
});
afterAll(async () => {
  await own.stop();
  rmSync(dir, { recursive: true, force: true });
});

describe('s3cmd', () => {
  it('lists, makes and removes buckets', async () => {
    await s3cmd('mb', 's3://archive');
    expect(await s3cmd('ls')).toMatch(/s3:\/\/archive\n[\s\S]*s3:\/\/pictures\n/);
    await s3cmd('rb', 's3://archive');
    expect(await s3cmd('ls')).not.toContain('s3://archive');
  });

  it('puts, gets, copies, moves and deletes a file with a name of other alphabets', async () => {
    const file = path.join(dir, 'Übersicht & Höfe (1).txt');
    writeFileSync(file, 'across the basin');
    await s3cmd('put', file, 's3://pictures/one/Übersicht & Höfe (1).txt');
    await s3cmd('cp', 's3://pictures/one/Übersicht & Höfe (1).txt', 's3://pictures/two/copy+1.txt');
    await s3cmd('mv', 's3://pictures/two/copy+1.txt', 's3://pictures/three/moved.txt');
    const back = path.join(dir, 'back.txt');
    await s3cmd('get', 's3://pictures/three/moved.txt', back);
    expect(readFileSync(back, 'utf8')).toBe('across the basin');
    expect(await s3cmd('ls', '--recursive', 's3://pictures/')).not.toContain('two/copy');
    await s3cmd('del', '--recursive', '--force', 's3://pictures/one/');
    expect(await s3cmd('ls', 's3://pictures/')).not.toContain('one/');
  });

  it('uploads 17 MiB in parts and gets the same bytes back', async () => {
    const body = randomBytes(17 * MIB);
    const [file, back] = [path.join(dir, 'large.bin'), path.join(dir, 'large-back.bin')];
    writeFileSync(file, body);
    await s3cmd('put', '--multipart-chunk-size-mb=5', file, 's3://pictures/large.bin');
    await s3cmd('get', 's3://pictures/large.bin', back);
    expect(readFileSync(back).equals(body)).toBe(true);
    expect(await s3cmd('du', 's3://pictures/large.bin')).toMatch(new RegExp(`^\\s*${17 * MIB}\\s+1 objects`));
  });

  it('synchronises a folder, and finds nothing to do the second time', async () => {
    const folder = path.join(dir, 'folder');
    mkdirSync(path.join(folder, 'deep/er'), { recursive: true });
    for (let index = 0; index < 12; index += 1) writeFileSync(path.join(folder, `deep/er/${index}.txt`), `file ${index}`);
    expect((await s3cmd('sync', `${folder}/`, 's3://pictures/sync/')).match(/^upload:/gm)).toHaveLength(12);
    expect(await s3cmd('sync', `${folder}/`, 's3://pictures/sync/')).not.toContain('upload:');
    const listed = await s3cmd('ls', 's3://pictures/sync/deep/');
    expect(listed).toMatch(/DIR\s+s3:\/\/pictures\/sync\/deep\/er\//);
  });

  it('shows and aborts an unfinished upload', async () => {
    const { CreateMultipartUploadCommand } = await import('@aws-sdk/client-s3');
    const { UploadId = '' } = await own.client.send(new CreateMultipartUploadCommand({ Bucket: 'pictures', Key: 'left.bin' }));
    expect(await s3cmd('multipart', 's3://pictures')).toContain(UploadId);
    await s3cmd('abortmp', 's3://pictures/left.bin', UploadId);
    expect(await s3cmd('multipart', 's3://pictures')).not.toContain(UploadId);
  });

  it('is refused with a wrong secret', async () => {
    await expect(s3cmd('--secret_key=guess', 'ls', 's3://pictures/')).rejects.toMatchObject({ stderr: expect.stringContaining('403') });
  });
});
