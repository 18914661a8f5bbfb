import { randomBytes } from 'node:crypto';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  DeleteObjectCommand,
  GetObjectCommand,
  HeadObjectCommand,
  ListPartsCommand,
  PutObjectCommand,
  UploadPartCommand,
} from '@aws-sdk/client-s3';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { clientOf, type OwnStore, startOwnStore } from '../docker-free-dev/own-store.ts';

/** What the switch for faults does, seen by the official client with and without its retries. */
let own: OwnStore;
beforeAll(async () => void (own = await startOwnStore()));
afterEach(() => own.store.faults.clear());
afterAll(() => own.stop());

const Bucket = 'pictures';
const MIB = 1024 * 1024;
const once = () => clientOf(own.store.endpoint, { maxAttempts: 1 });
const put = (Key: string, Body: string | Buffer, client = own.client) => client.send(new PutObjectCommand({ Bucket, Key, Body }));
const exists = (Key: string) =>
  own.client.send(new HeadObjectCommand({ Bucket, Key })).then(
    () => true,
    () => false,
  );

describe('a store that fails on demand', () => {
  it('answers the status asked for, as often as asked for, without doing anything', async () => {
    own.store.faults.failNext({ method: 'PUT', keyPattern: 'pictures/status', status: 503, times: 2 });
    await expect(put('status', 'x', once())).rejects.toMatchObject({ name: 'SlowDown' });
    expect(await exists('status')).toBe(false);
    await expect(put('status', 'x', once())).rejects.toMatchObject({ name: 'SlowDown' });
    await put('status', 'x', once());
    expect(own.store.faults.met).toEqual(['PUT pictures/status', 'PUT pictures/status']);
  });

  it('spares other methods and keys', async () => {
    own.store.faults.failNext({ method: 'GET', keyPattern: /\.tif$/, status: 500 });
    await put('a.jpg', 'x', once());
    await once().send(new GetObjectCommand({ Bucket, Key: 'a.jpg' }));
    await put('a.tif', 'x', once());
    await expect(once().send(new GetObjectCommand({ Bucket, Key: 'a.tif' }))).rejects.toMatchObject({ name: 'InternalError' });
  });

  it('cuts an upload in the middle and keeps nothing of it; a client that tries again gets through', async () => {
    const body = randomBytes(2 * MIB);
    own.store.faults.failNext({ method: 'PUT', keyPattern: 'cut', dropConnectionAfterBytes: 300_000 });
    await expect(put('cut', body, once())).rejects.toThrow();
    expect(await exists('cut')).toBe(false);
    own.store.faults.failNext({ method: 'PUT', keyPattern: 'cut', dropConnectionAfterBytes: 300_000 });
    await put('cut', body);
    expect((await own.client.send(new HeadObjectCommand({ Bucket, Key: 'cut' }))).ContentLength).toBe(2 * MIB);
  });

  it('cuts an overwriting upload and leaves the old object whole', async () => {
    await put('old', 'the old one');
    own.store.faults.failNext({ method: 'PUT', keyPattern: 'old', dropConnectionAfterBytes: 1000 });
    await expect(put('old', randomBytes(MIB), once())).rejects.toThrow();
    const { Body } = await own.client.send(new GetObjectCommand({ Bucket, Key: 'old' }));
    expect(await Body?.transformToString()).toBe('the old one');
  });

  it('cuts a download after some bytes', async () => {
    await put('download', randomBytes(4 * MIB));
    own.store.faults.failNext({ method: 'GET', keyPattern: 'download', dropConnectionAfterBytes: MIB });
    const { Body } = await once().send(new GetObjectCommand({ Bucket, Key: 'download' }));
    await expect(Body?.transformToByteArray()).rejects.toThrow();
  });

  it('does the work and loses the answer: a second completion of an upload finds nothing to do', async () => {
    const { UploadId } = await own.client.send(new CreateMultipartUploadCommand({ Bucket, Key: 'lost' }));
    const to = { Bucket, Key: 'lost', UploadId };
    const { ETag } = await own.client.send(new UploadPartCommand({ ...to, PartNumber: 1, Body: 'part' }));
    const complete = new CompleteMultipartUploadCommand({ ...to, MultipartUpload: { Parts: [{ ETag, PartNumber: 1 }] } });
    own.store.faults.failNext({ method: 'POST', keyPattern: 'lost', loseAnswer: true });
    await expect(once().send(complete)).rejects.toThrow();
    expect(await exists('lost')).toBe(true);
    await expect(once().send(complete)).rejects.toMatchObject({ name: 'NoSuchUpload' });
  });

  it('waits before it answers, and drops a request without a body before doing anything', async () => {
    await put('slow', 'x');
    own.store.faults.failNext({ method: 'DELETE', keyPattern: 'slow', dropConnectionAfterBytes: 0 });
    await expect(once().send(new DeleteObjectCommand({ Bucket, Key: 'slow' }))).rejects.toThrow();
    expect(await exists('slow')).toBe(true);
    own.store.faults.failNext({ method: 'GET', keyPattern: 'slow', delayMs: 200, status: 500 });
    await expect(once().send(new GetObjectCommand({ Bucket, Key: 'slow' }))).rejects.toMatchObject({ name: 'InternalError' });
  });

  it('refuses a part that comes in while its upload is given up', async () => {
    const { UploadId } = await own.client.send(new CreateMultipartUploadCommand({ Bucket, Key: 'gone' }));
    own.store.faults.failNext({ method: 'PUT', keyPattern: 'gone', delayMs: 300 });
    const part = once().send(new UploadPartCommand({ Bucket, Key: 'gone', UploadId, PartNumber: 1, Body: 'late' }));
    const refused = expect(part).rejects.toMatchObject({ name: 'NoSuchUpload' });
    await own.client.send(new AbortMultipartUploadCommand({ Bucket, Key: 'gone', UploadId }));
    await refused;
    await expect(own.client.send(new ListPartsCommand({ Bucket, Key: 'gone', UploadId }))).rejects.toMatchObject({ name: 'NoSuchUpload' });
  });
});
