import { createHash } from 'node:crypto';
import { readdirSync } from 'node:fs';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { chunkSignature, sha256, signingKey, trailerSignature } from '../../docker-free-dev/s3-store/signature.ts';
import { type OwnStore, startOwnStore } from './own-store.ts';
import { KEYS, send, signed, signHeaders } from './signed-request.ts';

let own: OwnStore;
beforeAll(async () => void (own = await startOwnStore()));
afterAll(() => own.stop());

const get = (key: string) => signed(own.store, { path: `/pictures/${key}` });
const codeIn = (text: string) => /<Code>(\w+)<\/Code>/.exec(text)?.[1];

function blobsOnDisk(): string[] {
  const root = path.join(own.dir, 'blobs');
  return readdirSync(root).flatMap((shelf) => readdirSync(path.join(root, shelf)));
}

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

  it('that are wrong at their beginning are refused with a word, however much follows', async () => {
    const body = `zzzz\r\n${'x'.repeat(10_000_000)}`;
    const answer = await sendUnsigned('long', body, 10_000_000);
    expect([answer.status, codeIn(answer.text)]).toEqual([400, 'InvalidChunkSizeError']);
  });
});
