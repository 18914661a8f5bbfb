import { execFile } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import { connect, createServer as createTcp, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import express from 'express';
import { pino } from 'pino';
import supertest from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ByteRange } from '../../api/domain/byte-ranges.ts';
import { sendObject, type StoredObject } from '../../api/features/downloads/send-object.ts';
import { problems } from '../../api/middleware/problem.ts';
import { attachmentName } from '../../api/features/downloads/attachment-name.ts';
import { Store } from '../../api/services/storage.ts';
import { startStore, type RunningStore } from '../../docker-free-dev/s3-store.ts';

const run = promisify(execFile);
const BYTES = randomBytes(1000);
const LARGE = randomBytes(24 * 2 ** 20);
const sha256 = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex');
const MODIFIED = new Date('2026-11-24T10:20:30.500Z');
const LAST_MODIFIED = 'Tue, 24 Nov 2026 10:20:30 GMT';
const ETAG = `"${sha256(BYTES)}"`;

let dir: string;
let running: RunningStore;
let store: Store;
let server: Server;
let port: number;
let request: ReturnType<typeof supertest>;
const sent: ByteRange[] = [];
let begun = 0;
let ended = 0;

function objectOf(name: string): StoredObject {
  const bytes = name === 'large' ? LARGE : BYTES;
  return {
    key: name,
    size: bytes.length,
    sha256: sha256(bytes),
    modified: MODIFIED,
    name: 'Brücke\r\n\u202egpj.jpg',
    mediaType: 'image/jpeg',
  };
}

beforeAll(async () => {
  dir = mkdtempSync(join(tmpdir(), 'downloads-'));
  const keys = { accessKeyId: 'tests', secretAccessKey: 'a-secret-of-the-tests' };
  running = await startStore({ dir: join(dir, 'store'), buckets: ['oriel'], ...keys });
  store = new Store({ endpoint: running.endpoint, region: 'us-east-1', bucket: 'oriel', pathStyle: true, ...keys });
  await store.put('small', BYTES, 'image/jpeg');
  await store.put('large', LARGE, 'image/jpeg');
  await store.put('short', BYTES.subarray(0, 500), 'image/jpeg');
  const app = express();
  app.all('/:name', (req, res) =>
    sendObject(req, res, store, objectOf(req.params.name ?? ''), {
      begin: () => void begun++,
      sent: (range) => void sent.push(range),
      end: () => void ended++,
    }),
  );
  app.use(problems(pino({ level: 'silent' })));
  server = createServer(app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  port = (server.address() as AddressInfo).port;
  request = supertest(`http://127.0.0.1:${port}`);
});
afterAll(async () => {
  server.closeAllConnections();
  server.close();
  store.stop();
  await running.stop();
  rmSync(dir, { recursive: true });
});

const get = (range?: string, headers: Record<string, string> = {}) => {
  const asked = request.get('/small').set(headers).buffer(true);
  return (range === undefined ? asked : asked.set('Range', range)).parse((res, done) => {
    const chunks: Buffer[] = [];
    res.on('data', (chunk: Buffer) => chunks.push(chunk)).on('end', () => done(null, Buffer.concat(chunks)));
  });
};

describe('a whole file (RFC 9110 §8.6, §8.8, §14.3)', () => {
  it('comes with its exact length, a strong tag, its time, and is kept by nobody', async () => {
    const answer = await get();
    expect(answer.status).toBe(200);
    expect(BYTES.equals(answer.body as Buffer)).toBe(true);
    expect(answer.headers).toMatchObject({
      'content-length': '1000',
      etag: ETAG,
      'last-modified': LAST_MODIFIED,
      'accept-ranges': 'bytes',
      'cache-control': 'private, no-store',
      'x-content-type-options': 'nosniff',
      'content-type': 'image/jpeg',
    });
    expect(answer.headers['content-range']).toBeUndefined();
  });

  it('is named without line breaks and direction marks (RFC 6266, RFC 8187)', async () => {
    const { headers } = await get();
    expect(headers['content-disposition']).toBe(`attachment; filename="Bruckegpj.jpg"; filename*=UTF-8''Br%C3%BCckegpj.jpg`);
  });

  it.each([
    ['Harbour.jpg', 'attachment; filename="Harbour.jpg"'],
    ['Müller & Söhne.jpg', `attachment; filename="Muller & Sohne.jpg"; filename*=UTF-8''M%C3%BCller%20%26%20S%C3%B6hne.jpg`],
    ['日本.jpg', `attachment; filename="_.jpg"; filename*=UTF-8''%E6%97%A5%E6%9C%AC.jpg`],
    ["it's (1) 100%.jpg", `attachment; filename="it's (1) 100%.jpg"`],
    ['€ rates.txt', `attachment; filename="_ rates.txt"; filename*=UTF-8''%E2%82%AC%20rates.txt`],
  ])('%s', (name, header) => {
    expect(attachmentName(name)).toBe(header);
  });

  it('is described by HEAD, which knows no ranges (§9.3.2, §14.2)', async () => {
    const answer = await request.head('/small').set('Range', 'bytes=0-9');
    expect([answer.status, answer.headers['content-length'], answer.headers['content-range']]).toEqual([200, '1000', undefined]);
  });
});

describe('a part of a file of 1000 bytes (RFC 9110 §14.1.2, §14.2, §15.3.7)', () => {
  it.each([
    ['bytes=0-499', 0, 499],
    ['bytes=500-', 500, 999],
    ['bytes=-500', 500, 999],
    ['bytes=900-2000', 900, 999],
    ['bytes=0-0', 0, 0],
    ['bytes=-1', 999, 999],
    ['bytes=-5000', 0, 999],
    ['bytes=0-1,2000-3000', 0, 1],
    ['bytes=0-99999999999999999999999', 0, 999],
  ])('%s', async (range, start, end) => {
    const answer = await get(range);
    expect(answer.status).toBe(206);
    expect(answer.headers['content-range']).toBe(`bytes ${start}-${end}/1000`);
    expect(answer.headers['content-length']).toBe(String(end - start + 1));
    expect(answer.headers).toMatchObject({ etag: ETAG, 'cache-control': 'private, no-store' });
    expect(BYTES.subarray(start, end + 1).equals(answer.body as Buffer)).toBe(true);
  });

  it.each(['bytes=500-20', 'bytes=abc-', 'bytes', 'items=0-5'])('%s is ignored', async (range) => {
    const answer = await get(range);
    expect([answer.status, (answer.body as Buffer).length]).toEqual([200, 1000]);
  });

  it.each(['bytes=1000-', 'bytes=1000-1001', 'bytes=-0'])('%s cannot be satisfied (§15.5.17)', async (range) => {
    const answer = await request.get('/small').set('Range', range);
    expect(answer.status).toBe(416);
    expect(answer.headers['content-range']).toBe('bytes */1000');
    expect(answer.type).toBe('application/problem+json');
  });

  it('several parts travel as multipart/byteranges (§14.6)', async () => {
    const answer = await get('bytes=0-0,-1');
    expect(answer.status).toBe(206);
    expect(answer.headers['content-range']).toBeUndefined();
    const boundary = /^multipart\/byteranges; boundary=(\S+)$/.exec(answer.headers['content-type'] ?? '')?.[1];
    const text = (answer.body as Buffer).toString('latin1');
    expect(answer.headers['content-length']).toBe(String(text.length));
    const part = (n: number, at: number) =>
      `\r\n--${boundary}\r\nContent-Type: image/jpeg\r\nContent-Range: bytes ${n}-${n}/1000\r\n\r\n${BYTES.subarray(at, at + 1).toString('latin1')}`;
    expect(text).toBe(`${part(0, 0)}${part(999, 999)}\r\n--${boundary}--\r\n`);
  });
});

describe('conditions (RFC 9110 §13)', () => {
  it.each([
    ['the same tag', ETAG, 206],
    ['another tag', '"old"', 200],
    ['a weak tag', `W/${ETAG}`, 200],
    ['exactly Last-Modified', LAST_MODIFIED, 206],
    ['a later date', 'Wed, 25 Nov 2026 10:20:30 GMT', 200],
    ['nonsense', 'whenever', 200],
  ])('If-Range with %s (§13.1.5)', async (_name, condition, status) => {
    expect((await get('bytes=0-9', { 'If-Range': condition })).status).toBe(status);
  });

  it.each([
    ['the same tag', { 'If-None-Match': ETAG }, 304],
    ['the same tag, weak', { 'If-None-Match': `"x", W/${ETAG}` }, 304],
    ['anything', { 'If-None-Match': '*' }, 304],
    ['another tag', { 'If-None-Match': '"x"' }, 206],
    ['another tag, though not modified since', { 'If-None-Match': '"x"', 'If-Modified-Since': LAST_MODIFIED }, 206],
    ['not modified since', { 'If-Modified-Since': LAST_MODIFIED }, 304],
    ['not modified since, in asctime’s form', { 'If-Modified-Since': 'Tue Nov 24 10:20:30 2026' }, 304],
    ['modified since', { 'If-Modified-Since': 'Tue, 24 Nov 2026 10:20:29 GMT' }, 206],
    ['no date', { 'If-Modified-Since': '2026-12-24' }, 206],
    ['If-Match, the same', { 'If-Match': `"x", ${ETAG}` }, 206],
    ['If-Match, anything', { 'If-Match': '*' }, 206],
    ['If-Match, another', { 'If-Match': '"x"' }, 412],
    ['If-Match, weak', { 'If-Match': `W/${ETAG}` }, 412],
    ['unmodified since', { 'If-Unmodified-Since': LAST_MODIFIED }, 206],
    ['modified after', { 'If-Unmodified-Since': 'Tue, 24 Nov 2026 10:20:29 GMT' }, 412],
  ])('%s', async (_name, headers, status) => {
    const answer = await get('bytes=0-9', headers as Record<string, string>);
    expect(answer.status).toBe(status);
    if (status === 304)
      expect([answer.headers.etag, answer.headers['cache-control'], (answer.body as Buffer).length]).toEqual([
        ETAG,
        'private, no-store',
        0,
      ]);
  });
});

/** A line that breaks once after so many bytes of the answer. */
async function breakingLine(after: number): Promise<{ port: number; stop(): void }> {
  let broken = false;
  const line = createTcp((client) => {
    const upstream = connect(port, '127.0.0.1');
    let passed = 0;
    client.pipe(upstream);
    upstream.on('data', (chunk: Buffer) => {
      passed += chunk.length;
      if (!broken && passed > after) {
        broken = true;
        client.destroy();
        upstream.destroy();
      } else client.write(chunk);
    });
    upstream.on('end', () => client.end());
    for (const socket of [client, upstream]) socket.on('error', () => undefined);
  });
  await new Promise<void>((resolve) => line.listen(0, '127.0.0.1', resolve));
  return { port: (line.address() as AddressInfo).port, stop: () => void line.close() };
}

describe('a download that breaks off', () => {
  it('is continued by curl -C - and is whole in the end', async () => {
    const line = await breakingLine(5 * 2 ** 20);
    const file = join(dir, 'fetched');
    const fetch = () => run('curl', ['-sS', '-f', '-C', '-', '-o', file, `http://127.0.0.1:${line.port}/large`]);
    await expect(fetch()).rejects.toThrow(/transfer closed|Recv failure|bytes/);
    const first = readFileSync(file).length;
    expect(first).toBeGreaterThan(0);
    expect(first).toBeLessThan(LARGE.length);
    await fetch();
    expect(sha256(readFileSync(file))).toBe(sha256(LARGE));
    line.stop();
  });

  it('stops reading the store and says how far it came', async () => {
    sent.length = 0;
    const before = ended;
    const client = connect(port, '127.0.0.1');
    client.write('GET /large HTTP/1.1\r\nHost: a\r\n\r\n');
    await new Promise((resolve) => client.once('data', resolve));
    client.destroy();
    await expect.poll(() => ended).toBe(before + 1);
    const handed = sent.reduce((sum, { start, end }) => sum + end - start + 1, 0);
    expect(handed).toBeLessThan(LARGE.length);
  });
});

describe('a store in trouble', () => {
  it('is a 503 before the first byte, without the file’s headers', async () => {
    running.faults.failNext({ method: 'GET', keyPattern: 'small', status: 500, times: 10 });
    const answer = await request.get('/small');
    running.faults.clear();
    expect(answer.status).toBe(503);
    expect(answer.type).toBe('application/problem+json');
    expect(answer.headers['retry-after']).toBe('30');
    expect([answer.headers['content-disposition'], answer.headers['accept-ranges']]).toEqual([undefined, undefined]);
    expect(begun).toBeGreaterThan(0);
  });

  it('cuts the connection in the middle, so that nothing short looks whole', async () => {
    running.faults.failNext({ method: 'GET', keyPattern: 'large', dropConnectionAfterBytes: 100_000 });
    await expect(request.get('/large')).rejects.toThrow(/aborted|hang up/);
    await expect(request.get('/short')).rejects.toThrow(/aborted|hang up/);
  });
});
