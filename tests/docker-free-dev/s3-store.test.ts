import { createHash, randomBytes } from 'node:crypto';
import { existsSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startStore } from '../../docker-free-dev/s3-store.ts';
import { chunkSignature, sha256, signingKey, trailerSignature } from '../../docker-free-dev/s3-store/signature.ts';
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

describe('aws-chunked bodies', () => {
  const text = 'x'.repeat(70_000);
  const pieces = [text.slice(0, 65_536), text.slice(65_536)];
  const crc = { name: 'x-amz-checksum-sha256', value: createHash('sha256').update(text).digest('base64') };

  const unsignedBody = (parts: string[], trailer: string) =>
    [...parts, ''].map((part) => `${part.length.toString(16)}\r\n${part}${part ? '\r\n' : ''}`).join('') + `${trailer}\r\n`;

  async function sendUnsigned(key: string, body: string, decoded = text.length) {
    const headers = {
      'content-encoding': 'aws-chunked',
      'x-amz-content-sha256': 'STREAMING-UNSIGNED-PAYLOAD-TRAILER',
      'x-amz-trailer': crc.name,
      'x-amz-decoded-content-length': String(decoded),
      'content-length': String(body.length),
    };
    const request = { method: 'PUT', path: `/pictures/${key}`, headers };
    return send(own.store.port, { ...request, body, headers: await signHeaders(own.store, { ...request, signLength: false }) });
  }

  it('are stored without their framing, with a trailing checksum', async () => {
    const answer = await sendUnsigned('chunked', unsignedBody(pieces, `${crc.name}:${crc.value}\r\n`));
    expect([answer.status, answer.headers[crc.name]]).toEqual([200, crc.value]);
    const back = await get('chunked');
    expect([back.text === text, back.headers['content-encoding']]).toEqual([true, undefined]);
  });

  it('are refused with a wrong trailer, a wrong length, broken framing or an early end', async () => {
    const before = blobsOnDisk().length;
    const good = unsignedBody(pieces, `${crc.name}:${crc.value}\r\n`);
    const codes = [
      await sendUnsigned('bad', unsignedBody(pieces, `${crc.name}:${'A'.repeat(43)}=\r\n`)),
      await sendUnsigned('bad', good, text.length - 1),
      await sendUnsigned('bad', good, text.length + 1),
      await sendUnsigned('bad', good.replace('10000\r\n', 'zzzz\r\n')),
      await sendUnsigned('bad', good.slice(0, 66_000)),
      await sendUnsigned('bad', 'f'.repeat(20_000)),
    ].map((answer) => codeIn(answer.text));
    expect(codes).toEqual([
      'BadDigest',
      'IncompleteBody',
      'IncompleteBody',
      'InvalidChunkSizeError',
      'IncompleteBody',
      'InvalidChunkSizeError',
    ]);
    expect((await get('bad')).status).toBe(404);
    expect(blobsOnDisk()).toHaveLength(before);
  });

  async function sendSigned(key: string, options: { trailer?: boolean; spoil?: (body: string) => string }) {
    const headers: Record<string, string> = {
      'x-amz-content-sha256': `STREAMING-AWS4-HMAC-SHA256-PAYLOAD${options.trailer ? '-TRAILER' : ''}`,
      'x-amz-decoded-content-length': String(text.length),
      ...(options.trailer ? { 'x-amz-trailer': crc.name } : {}),
    };
    // The length is only known once the chunks are signed, so it is no part of the first signature.
    const request = { method: 'PUT', path: `/pictures/${key}`, headers, signLength: false };
    const signedHeaders = await signHeaders(own.store, request);
    const date = signedHeaders['x-amz-date'] ?? '';
    const scope = { day: date.slice(0, 8), region: 'us-east-1' };
    const seed = /Signature=(\w+)/.exec(signedHeaders.authorization ?? '')?.[1] ?? '';
    const signing = { key: signingKey(KEYS.secretAccessKey, scope), date, scope, seed };
    let previous = seed;
    let body = '';
    for (const piece of [...pieces, '']) {
      previous = chunkSignature(signing, previous, sha256(piece));
      body += `${piece.length.toString(16)};chunk-signature=${previous}\r\n${piece}${piece ? '\r\n' : ''}`;
    }
    if (options.trailer) {
      const signature = trailerSignature(signing, previous, `${crc.name}:${crc.value}\n`);
      body += `${crc.name}:${crc.value}\r\nx-amz-trailer-signature:${signature}\r\n`;
    }
    body += '\r\n';
    if (options.spoil) body = options.spoil(body);
    return send(own.store.port, { ...request, body, headers: { ...signedHeaders, 'content-length': String(body.length) } });
  }

  it.each([{ trailer: false }, { trailer: true }])(
    'that are signed chunk by chunk are believed, trailer: $trailer',
    async ({ trailer }) => {
      expect((await sendSigned('chain', { trailer })).status).toBe(200);
      expect((await get('chain')).text).toBe(text);
    },
  );

  it.each([
    ['a byte', (body: string) => body.replace('xxxx', 'xxxy')],
    ['a signature', (body: string) => body.replace(/(400;chunk-signature=|1170;chunk-signature=)./, '$1_')],
    ['the trailer', (body: string) => body.replace('x-amz-checksum-sha256:', 'x-amz-checksum-sha256:A')],
    ["the trailer's signature", (body: string) => body.replace(/trailer-signature:\w{4}/, 'trailer-signature:0000')],
  ])('that were changed in %s are refused', async (_what, spoil) => {
    const answer = await sendSigned('spoilt', { trailer: true, spoil });
    expect([answer.status, codeIn(answer.text)]).toEqual([403, 'SignatureDoesNotMatch']);
    expect((await get('spoilt')).status).toBe(404);
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
