import { createHash, type Hash } from 'node:crypto';
import { type Call, headerOf } from './call.ts';
import { startChecksum, type Summer } from './checksums.ts';
import { decodeChunks } from './chunked.ts';
import type { Checksum } from './entries.ts';
import { cutAfter } from './faults.ts';
import { UNSIGNED_PAYLOAD } from './signature.ts';
import { StoreError } from './store-error.ts';

/** Largest body of a single PUT or part (AWS S3 user guide, "Amazon S3 multipart upload limits"). */
const LARGEST_BODY = 5 * 1024 ** 3;
const STREAMING = /^STREAMING-(AWS4-HMAC-SHA256-PAYLOAD|UNSIGNED-PAYLOAD)(-TRAILER)?$/;

/** What was received, all checks passed. */
export interface Received {
  blob: string;
  size: number;
  /** hex */
  md5: string;
  checksum?: Checksum;
}

interface Sums {
  size: number;
  md5: Hash;
  sha256: Hash | null;
  checksum: { algorithm: string; summer: Summer } | null;
}

/** Bytes the body will have once decoded; without that number nothing is taken in. */
function declaredSize(call: Call): number {
  const text = headerOf(call, 'x-amz-decoded-content-length') ?? headerOf(call, 'content-length');
  if (text === undefined) throw new StoreError(411, 'MissingContentLength', 'The length of the body must be given.');
  const size = Number(text);
  if (!/^\d+$/.test(text) || !Number.isSafeInteger(size)) throw new StoreError(400, 'InvalidArgument', 'The length is not a number.');
  if (size > LARGEST_BODY) throw new StoreError(400, 'EntityTooLarge', 'A single upload may have at most 5 GiB.');
  return size;
}

/** The checksum the client named, in whichever of four places it did. */
function startNamedChecksum(call: Call): Sums['checksum'] {
  const names = [...Object.keys(call.req.headers), ...[...call.query.keys()].map((name) => name.toLowerCase())];
  const given = names.map((name) => /^x-amz-checksum-(crc32c?|crc64nvme|sha1|sha256)$/.exec(name)?.[1]).find(Boolean);
  const trailing = /x-amz-checksum-(\w+)/.exec(headerOf(call, 'x-amz-trailer') ?? '')?.[1];
  const algorithm = given ?? trailing ?? headerOf(call, 'x-amz-sdk-checksum-algorithm')?.toLowerCase();
  if (algorithm === undefined) return null;
  const summer = startChecksum(algorithm);
  if (!summer) throw new StoreError(501, 'NotImplemented', `The checksum ${algorithm} is not supported here.`);
  return { algorithm, summer };
}

function decoded(call: Call, trailers: Map<string, string>): AsyncIterable<Buffer> {
  const { contentSha256, signing } = call.proof;
  const limit = call.fault?.dropConnectionAfterBytes;
  // Giving up in the middle of a body must not cut the line: the client is to hear why.
  const body = call.req.iterator({ destroyOnReturn: false }) as AsyncIterable<Buffer>;
  const wire = limit === undefined ? body : cutAfter(body, limit, call.req);
  if (!contentSha256.startsWith('STREAMING-')) return wire;
  const [known, kind] = STREAMING.exec(contentSha256) ?? [];
  if (!known) throw new StoreError(501, 'NotImplemented', `${contentSha256} is not supported here.`);
  return decodeChunks(wire, kind === UNSIGNED_PAYLOAD ? null : signing, trailers);
}

function startSums(call: Call): Sums {
  const { contentSha256 } = call.proof;
  const hashed = /^[0-9a-f]{64}$/.test(contentSha256);
  if (!hashed && contentSha256 !== UNSIGNED_PAYLOAD && !contentSha256.startsWith('STREAMING-')) {
    throw new StoreError(400, 'InvalidArgument', 'x-amz-content-sha256 must be a hash or one of the agreed words.');
  }
  return { size: 0, md5: createHash('md5'), sha256: hashed ? createHash('sha256') : null, checksum: startNamedChecksum(call) };
}

/** Compares everything the client said about the body with what arrived. */
function settle(call: Call, sums: Sums, expected: number, trailers: Map<string, string>): Omit<Received, 'blob'> {
  if (sums.size !== expected) throw new StoreError(400, 'IncompleteBody', `${expected} bytes were announced, ${sums.size} arrived.`);
  if (sums.sha256 && sums.sha256.digest('hex') !== call.proof.contentSha256) throw new StoreError(400, 'XAmzContentSHA256Mismatch');
  const md5 = sums.md5.digest();
  const givenMd5 = call.req.headers['content-md5'];
  if (givenMd5 !== undefined && givenMd5 !== md5.toString('base64')) throw new StoreError(400, 'BadDigest', 'Content-MD5 does not match.');
  if (!sums.checksum) return { size: sums.size, md5: md5.toString('hex') };
  const { algorithm, summer } = sums.checksum;
  const [name, value] = [`x-amz-checksum-${algorithm}`, summer.digest()];
  const given = trailers.get(name) ?? headerOf(call, name);
  if (given !== undefined && given !== value) throw new StoreError(400, 'BadDigest', `${name} does not match.`);
  return { size: sums.size, md5: md5.toString('hex'), checksum: { algorithm, value } };
}

async function* checked(call: Call, done: (received: Omit<Received, 'blob'>) => void, limit: number): AsyncGenerator<Buffer> {
  const expected = declaredSize(call);
  if (expected > limit) throw new StoreError(400, 'EntityTooLarge', `At most ${limit} bytes are accepted here.`);
  const sums = startSums(call);
  const trailers = new Map<string, string>();
  if (call.req.headers.expect !== undefined) call.res.writeContinue();
  for await (const chunk of decoded(call, trailers)) {
    sums.size += chunk.length;
    if (sums.size > expected) throw new StoreError(400, 'IncompleteBody', 'More bytes arrived than were announced.');
    sums.md5.update(chunk);
    sums.sha256?.update(chunk);
    sums.checksum?.summer.update(chunk);
    yield chunk;
  }
  done(settle(call, sums, expected, trailers));
}

/** Streams the body into a blob. Nothing is kept where the length, a hash, a checksum or a signature is wrong. */
export async function receiveBlob(call: Call): Promise<Received> {
  let received: Omit<Received, 'blob'> | undefined;
  const blob = await call.blobs.write(checked(call, (result) => (received = result), LARGEST_BODY));
  if (!received) throw new StoreError(400, 'IncompleteBody');
  return { blob, ...received };
}

/** Reads a small body, an XML request, as text. */
export async function receiveText(call: Call): Promise<string> {
  const chunks: Buffer[] = [];
  for await (const chunk of checked(call, () => undefined, 4 * 1024 * 1024)) chunks.push(chunk);
  return Buffer.concat(chunks).toString('utf8');
}
