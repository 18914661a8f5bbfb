import { type ChildProcess, spawn } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import { appendFileSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import {
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  GetObjectCommand,
  ListPartsCommand,
  PutObjectCommand,
  type S3Client,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { clientOf } from '../docker-free-dev/own-store.ts';
import { KEYS } from '../docker-free-dev/signed-request.ts';

/** A store in a process of its own, ended by kill -9 at any moment. */
const Bucket = 'pictures';
const MIB = 1024 * 1024;
let dir: string;
let child: ChildProcess;
let client: S3Client;

function startElsewhere(): Promise<void> {
  const options = { dir, buckets: [Bucket], ...KEYS };
  const code = `import { startStore } from './docker-free-dev/s3-store.ts';
    startStore(${JSON.stringify(options)}).then((store) => console.log(store.endpoint));`;
  child = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', code], { stdio: ['ignore', 'pipe', 'inherit'] });
  return new Promise((resolve) => {
    child.stdout?.once('data', (line: Buffer) => {
      client = clientOf(line.toString().trim(), { maxAttempts: 1 });
      resolve();
    });
  });
}

async function kill(): Promise<void> {
  const ended = new Promise((resolve) => child.once('exit', resolve));
  child.kill('SIGKILL');
  await ended;
  client.destroy();
}

async function killAndStart(): Promise<void> {
  await kill();
  await startElsewhere();
}

const md5 = (body: Buffer) => createHash('md5').update(body).digest('hex');
const put = (Key: string, Body: Buffer) => client.send(new PutObjectCommand({ Bucket, Key, Body }));
const read = async (Key: string) =>
  Buffer.from((await (await client.send(new GetObjectCommand({ Bucket, Key }))).Body?.transformToByteArray()) ?? []);
const blobs = () => readdirSync(path.join(dir, 'blobs')).flatMap((shelf) => readdirSync(path.join(dir, 'blobs', shelf)));

beforeEach(async () => {
  dir = mkdtempSync(path.join(tmpdir(), 'oriel-killed-'));
  await startElsewhere();
});
afterEach(async () => {
  await kill();
  rmSync(dir, { recursive: true, force: true });
});

describe('a store that is killed', () => {
  it('has the old object or the new one, whole, wherever in an overwrite it died', async () => {
    const versions = [randomBytes(3 * MIB)];
    await put('picture', versions[0] as Buffer);
    for (const pause of [0, 3, 8, 20, 40]) {
      const next = randomBytes(3 * MIB);
      versions.push(next);
      const writing = put('picture', next).catch(() => undefined);
      await new Promise((resolve) => setTimeout(resolve, pause));
      await killAndStart();
      await writing;
      expect(versions.map(md5)).toContain(md5(await read('picture')));
    }
    expect(blobs()).toHaveLength(1);
  });

  it('has every write that it answered', async () => {
    const bodies = new Map<string, Buffer>();
    for (let number = 0; number < 20; number += 1) bodies.set(`answered/${number}`, randomBytes(10_000));
    await Promise.all([...bodies].map(([key, body]) => put(key, body)));
    await killAndStart();
    for (const [key, body] of bodies) expect(md5(await read(key))).toBe(md5(body));
  });

  it('knows the parts of an upload it was killed in, and finishes it', async () => {
    const body = randomBytes(10 * MIB);
    const { UploadId } = await client.send(new CreateMultipartUploadCommand({ Bucket, Key: 'parts', ContentType: 'image/tiff' }));
    const to = { Bucket, Key: 'parts', UploadId };
    await client.send(new UploadPartCommand({ ...to, PartNumber: 1, Body: body.subarray(0, 5 * MIB) }));
    const lost = client.send(new UploadPartCommand({ ...to, PartNumber: 2, Body: body.subarray(5 * MIB) })).catch(() => undefined);
    await killAndStart();
    await lost;
    const { Parts = [] } = await client.send(new ListPartsCommand(to));
    expect(Parts[0]?.PartNumber).toBe(1);
    const second = await client.send(new UploadPartCommand({ ...to, PartNumber: 2, Body: body.subarray(5 * MIB) }));
    const chosen = [
      { PartNumber: 1, ETag: Parts[0]?.ETag },
      { PartNumber: 2, ETag: second.ETag },
    ];
    await client.send(new CompleteMultipartUploadCommand({ ...to, MultipartUpload: { Parts: chosen } }));
    await killAndStart();
    expect(md5(await read('parts'))).toBe(md5(body));
    expect(blobs()).toHaveLength(2);
  });

  it('forgets a line of its journal that was torn, and nothing before it', async () => {
    await put('before', Buffer.from('before'));
    await kill();
    appendFileSync(path.join(dir, 'journal.jsonl'), '{"does":"put","bucket":"pictures","key":"torn","obj');
    await startElsewhere();
    expect((await read('before')).toString()).toBe('before');
    await expect(read('torn')).rejects.toMatchObject({ name: 'NoSuchKey' });
    await put('after', Buffer.from('after'));
    await killAndStart();
    expect((await read('after')).toString()).toBe('after');
  });
});
