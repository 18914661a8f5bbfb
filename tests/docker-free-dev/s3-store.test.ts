import { randomBytes } from 'node:crypto';
import { existsSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startStore } from '../../docker-free-dev/s3-store.ts';
import { type OwnStore, startOwnStore } from './own-store.ts';
import { KEYS, type RawRequest, send, signed, signHeaders } from './signed-request.ts';

const ORIGIN = 'http://127.0.0.1:4400';
let own: OwnStore;
beforeAll(async () => void (own = await startOwnStore({ corsOrigins: [ORIGIN] })));
afterAll(() => own.stop());

const call = (request: RawRequest) => signed(own.store, request);
const put = (key: string, body: string | Buffer, headers = {}) => call({ method: 'PUT', path: `/pictures/${key}`, body, headers });
const get = (key: string, headers = {}) => call({ path: `/pictures/${key}`, headers });
const codeIn = (text: string) => /<Code>(\w+)<\/Code>/.exec(text)?.[1];

function blobsOnDisk(): string[] {
  const root = path.join(own.dir, 'blobs');
  return readdirSync(root).flatMap((shelf) => readdirSync(path.join(root, shelf)));
}

describe('who may', () => {
  it('refuses anonymous requests of every kind with an XML error', async () => {
    for (const method of ['GET', 'PUT', 'DELETE', 'POST']) {
      const answer = await send(own.store.port, { method, path: '/pictures/a' });
      expect([answer.status, codeIn(answer.text), answer.headers['content-type']]).toEqual([403, 'AccessDenied', 'application/xml']);
    }
    expect((await send(own.store.port, { method: 'HEAD', path: '/pictures/a' })).status).toBe(403);
  });

  it('refuses a request that was signed twenty minutes ago', async () => {
    const answer = await call({ path: '/pictures', signingDate: new Date(Date.now() - 20 * 60_000) });
    expect([answer.status, codeIn(answer.text)]).toEqual([403, 'RequestTimeTooSkewed']);
  });

  it('names the right region to a client that signs for another', async () => {
    const answer = await call({ path: '/pictures', region: 'eu-central-1' });
    expect([answer.status, answer.headers['x-amz-bucket-region']]).toEqual([400, 'us-east-1']);
  });

  it('refuses a body other than the one that was signed, and keeps nothing', async () => {
    const headers = await signHeaders(own.store, { method: 'PUT', path: '/pictures/other', body: 'aaaa' });
    const answer = await send(own.store.port, { method: 'PUT', path: '/pictures/other', body: 'bbbb', headers });
    expect([answer.status, codeIn(answer.text)]).toEqual([400, 'XAmzContentSHA256Mismatch']);
    expect((await get('other')).status).toBe(404);
  });
});

describe('keys', () => {
  it('are never paths: dots, slashes and NUL stay inside the folder', async () => {
    for (const key of ['../../../evil', 'a/../../evil', '..', '%00', '/etc/passwd']) {
      expect((await put(key, 'inside')).status).toBe(200);
      expect((await get(key)).text).toBe('inside');
    }
    expect(existsSync(path.join(own.dir, '../evil')) || existsSync(path.join(own.dir, '../../evil'))).toBe(false);
    expect(blobsOnDisk().every((name) => /^[0-9a-f]{32}$/.test(name))).toBe(true);
  });

  it('that differ only in how a path would be folded are different objects', async () => {
    await put('fold/a', 'one');
    await put('fold//a', 'two');
    await put('fold/./a', 'three');
    expect([(await get('fold/a')).text, (await get('fold//a')).text, (await get('fold/./a')).text]).toEqual(['one', 'two', 'three']);
  });

  it('longer than 1,024 bytes and addresses that are not validly encoded are refused', async () => {
    expect(codeIn((await put('k'.repeat(1025), 'x')).text)).toBe('KeyTooLongError');
    const answer = await send(own.store.port, { path: '/pictures/%zz' });
    expect([answer.status, codeIn(answer.text)]).toEqual([400, 'InvalidURI']);
  });
});

describe('reading', () => {
  const body = Buffer.from(Array.from({ length: 1000 }, (_, index) => index % 251));
  beforeAll(async () => void (await put('thousand', body, { 'content-type': 'image/png' })));

  /** RFC 9110 (June 2022) 14.1.2, 14.2, 15.3.7, 15.5.17; several ranges at once may be ignored (14.2), as S3 does. */
  it.each([
    ['bytes=0-499', 206, 'bytes 0-499/1000', 500],
    ['bytes=500-', 206, 'bytes 500-999/1000', 500],
    ['bytes=-500', 206, 'bytes 500-999/1000', 500],
    ['bytes=900-2000', 206, 'bytes 900-999/1000', 100],
    ['bytes=0-0', 206, 'bytes 0-0/1000', 1],
    ['bytes=-1', 206, 'bytes 999-999/1000', 1],
    ['bytes=-5000', 206, 'bytes 0-999/1000', 1000],
    ['bytes=1000-', 416, 'bytes */1000', null],
    ['bytes=-0', 416, 'bytes */1000', null],
    ['bytes=500-20', 200, undefined, 1000],
    ['bytes=abc-', 200, undefined, 1000],
    ['bytes', 200, undefined, 1000],
    ['items=0-5', 200, undefined, 1000],
    ['bytes=0-1,5-6', 200, undefined, 1000],
    ['bytes=99999999999999999999999-', 416, 'bytes */1000', null],
  ])('Range: %s', async (range, status, contentRange, length) => {
    const answer = await get('thousand', { range });
    expect([answer.status, answer.headers['content-range']]).toEqual([status, contentRange]);
    if (length !== null) expect(answer.body).toHaveLength(length);
    const [, from] = /bytes (\d+)-/.exec(contentRange ?? '') ?? [];
    if (from !== undefined) expect(answer.body.equals(body.subarray(Number(from), Number(from) + (length ?? 0)))).toBe(true);
  });

  it('answers conditions (RFC 9110 13.1)', async () => {
    const { etag = '', 'last-modified': modified = '' } = (await get('thousand')).headers;
    const status = async (headers: Record<string, string>) => (await get('thousand', headers)).status;
    expect(await status({ 'if-none-match': etag })).toBe(304);
    expect(await status({ 'if-none-match': '"other"' })).toBe(200);
    expect(await status({ 'if-none-match': etag, range: 'bytes=0-1' })).toBe(304);
    expect(await status({ 'if-match': '"other"' })).toBe(412);
    expect(await status({ 'if-match': `"other", ${etag}` })).toBe(200);
    expect(await status({ 'if-modified-since': modified })).toBe(304);
    expect(await status({ 'if-unmodified-since': 'Mon, 01 Jan 2024 00:00:00 GMT' })).toBe(412);
    expect(await status({ range: 'bytes=0-1', 'if-range': etag })).toBe(206);
    expect(await status({ range: 'bytes=0-1', 'if-range': '"old"' })).toBe(200);
    expect(await status({ range: 'bytes=0-1', 'if-range': `W/${etag}` })).toBe(200);
  });

  it('answers HEAD with the length and no body, and an empty object with nothing', async () => {
    const head = await call({ method: 'HEAD', path: '/pictures/thousand' });
    expect([head.status, head.headers['content-length'], head.body.length]).toEqual([200, '1000', 0]);
    await put('empty', '');
    const empty = await get('empty');
    expect([empty.status, empty.headers['content-length'], empty.body.length]).toEqual([200, '0', 0]);
    expect((await get('empty', { range: 'bytes=0-' })).status).toBe(416);
  });

  it('finishes a download whose object was replaced meanwhile', async () => {
    const large = randomBytes(8 * 1024 * 1024);
    await put('replaced', large);
    const [answer] = await Promise.all([get('replaced'), put('replaced', 'new')]);
    expect(answer.body.equals(large) || answer.text === 'new').toBe(true);
    expect((await get('replaced')).text).toBe('new');
  });
});

describe('browsers', () => {
  const preflight = (origin: string, method = 'PUT') =>
    send(own.store.port, {
      method: 'OPTIONS',
      path: '/pictures/a',
      headers: { origin, 'access-control-request-method': method, 'access-control-request-headers': 'content-type,x-amz-meta-a' },
    });

  it('on the allowed origin get their preflight answered', async () => {
    const answer = await preflight(ORIGIN);
    expect(answer.status).toBe(200);
    expect(answer.headers).toMatchObject({
      'access-control-allow-origin': ORIGIN,
      'access-control-allow-headers': 'content-type,x-amz-meta-a',
    });
    expect(answer.headers['access-control-allow-methods']).toContain('PUT');
  });

  it('elsewhere do not', async () => {
    expect((await preflight('http://evil.example')).status).toBe(403);
    expect((await preflight(ORIGIN, 'PATCH')).status).toBe(403);
    expect((await get('thousand', { origin: 'http://evil.example' })).headers['access-control-allow-origin']).toBeUndefined();
  });

  it('see the ETag of their upload, and errors as well', async () => {
    const answer = await put('cors', 'x', { origin: ORIGIN });
    expect(answer.headers['access-control-expose-headers']).toContain('ETag');
    const refused = await send(own.store.port, { path: '/pictures/cors', headers: { origin: ORIGIN } });
    expect([refused.status, refused.headers['access-control-allow-origin']]).toEqual([403, ORIGIN]);
  });
});

describe('limits', () => {
  it('asks for the length of a body', async () => {
    const request = {
      method: 'PUT',
      path: '/pictures/nolength',
      headers: { 'x-amz-content-sha256': 'UNSIGNED-PAYLOAD' },
      signLength: false,
    };
    const headers = { ...(await signHeaders(own.store, request)), 'transfer-encoding': 'chunked' };
    const answer = await send(own.store.port, { ...request, headers, body: 'x' });
    expect([answer.status, codeIn(answer.text)]).toEqual([411, 'MissingContentLength']);
  });

  it('bounds headers and metadata', async () => {
    expect((await put('meta', 'x', { 'x-amz-meta-long': 'v'.repeat(3000) })).text).toContain('MetadataTooLarge');
    expect((await send(own.store.port, { path: '/pictures', headers: { 'x-long': 'v'.repeat(20_000) } })).status).toBe(431);
  });

  it('says what it does not do instead of doing something else', async () => {
    for (const query of [{ acl: '' }, { tagging: '' }, { versionId: 'x' }, { policy: '' }] as Record<string, string>[]) {
      const answer = await call({ path: '/pictures/thousand', query });
      expect([answer.status, codeIn(answer.text)]).toEqual([501, 'NotImplemented']);
    }
    expect((await call({ method: 'PATCH', path: '/pictures/thousand' })).status).toBe(405);
  });

  it('refuses XML with declarations', async () => {
    const body = '<!DOCTYPE d [<!ENTITY e "x">]><Delete><Object><Key>&e;</Key></Object></Delete>';
    const answer = await call({ method: 'POST', path: '/pictures', query: { delete: '' }, body });
    expect([answer.status, codeIn(answer.text)]).toEqual([400, 'MalformedXML']);
  });
});

describe('the folder', () => {
  it('belongs to one store at a time', async () => {
    await expect(startStore({ dir: own.dir, buckets: [], ...KEYS })).rejects.toThrow(/in use by process/);
  });

  it('holds the same after a restart, and loses leftovers of writes that never ended', async () => {
    await put('kept', 'kept', { 'x-amz-meta-a': 'b' });
    const before = blobsOnDisk().length;
    const leftover = path.join(own.dir, 'blobs/00', '00'.repeat(16));
    writeFileSync(leftover, 'half');
    await own.restart();
    expect(existsSync(leftover)).toBe(false);
    expect(blobsOnDisk()).toHaveLength(before);
    expect((await get('kept')).headers['x-amz-meta-a']).toBe('b');
  });

  it('is closed to other users', () => {
    expect(statSync(path.join(own.dir, 'journal.jsonl')).mode & 0o077).toBe(0);
  });

  it('gives the space of deleted and replaced objects back', async () => {
    const before = blobsOnDisk().length;
    await put('space', 'one');
    await put('space', 'two');
    await call({ method: 'DELETE', path: '/pictures/space' });
    await expect.poll(() => blobsOnDisk().length).toBe(before);
  });
});
