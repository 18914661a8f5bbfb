import { pipeline } from 'node:stream/promises';
import { receiveBlob, receiveText } from './body.ts';
import { bucketOf, type Call, sendEmpty, sendHead, sendXml } from './call.ts';
import { isUnchanged, type Range, requestedRange, requireWritable } from './conditions.ts';
import type { Piece, StoredObject } from './entries.ts';
import { cutAfter } from './faults.ts';
import { describingHeaders, keptHeaders } from './object-headers.ts';
import { StoreError } from './store-error.ts';
import { inner, text, type XmlChild } from './xml.ts';

/** Now, in milliseconds, cut to the whole seconds that HTTP dates can say. */
export const thisSecond = (): number => Math.floor(Date.now() / 1000) * 1000;

/** @throws StoreError where there is no such key */
function objectOf(call: Call): StoredObject {
  const object = bucketOf(call).objects.get(call.key);
  if (!object) throw new StoreError(404, 'NoSuchKey', 'The specified key does not exist.');
  return object;
}

/** Puts the object in its place unless a precondition stopped holding meanwhile; its blobs go where it may not. */
function commit(call: Call, object: StoredObject): void {
  try {
    requireWritable(call.req.headers, bucketOf(call).objects.get(call.key));
    call.blobs.remove(call.catalogue.record({ does: 'put', bucket: call.bucket, key: call.key, object }));
  } catch (error) {
    call.blobs.remove(object.pieces.map((piece) => piece.blob));
    throw error;
  }
}

export async function putObject(call: Call): Promise<void> {
  requireWritable(call.req.headers, bucketOf(call).objects.get(call.key));
  const headers = keptHeaders(call);
  const { blob, size, md5, checksum } = await receiveBlob(call);
  commit(call, { pieces: [{ blob, size }], size, etag: md5, modified: thisSecond(), headers, checksum });
  const sums = checksum ? { [`x-amz-checksum-${checksum.algorithm}`]: checksum.value } : {};
  sendEmpty(call, 200, { etag: `"${md5}"`, ...sums });
}

function copySource(call: Call): { object: StoredObject; itself: boolean } {
  const given = String(call.req.headers['x-amz-copy-source']).replace(/^\//, '');
  const conditional = Object.keys(call.req.headers).some((name) => name.startsWith('x-amz-copy-source-'));
  if (given.includes('?') || conditional)
    throw new StoreError(501, 'NotImplemented', 'Conditional and versioned copies are not supported.');
  const slash = given.indexOf('/');
  const [bucket, key] = [decodeURIComponent(given.slice(0, slash)), decodeURIComponent(given.slice(slash + 1))];
  const object = call.catalogue.buckets.get(bucket)?.objects.get(key);
  if (!object) throw new StoreError(404, 'NoSuchKey', 'The source of the copy does not exist.');
  return { object, itself: bucket === call.bucket && key === call.key };
}

export async function copyObject(call: Call): Promise<void> {
  bucketOf(call);
  call.req.resume();
  const { object, itself } = copySource(call);
  const replace = call.req.headers['x-amz-metadata-directive'] === 'REPLACE';
  if (itself && !replace) throw new StoreError(400, 'InvalidRequest', 'A copy onto itself must replace the metadata.');
  const release = call.blobs.hold(object.pieces.map((piece) => piece.blob));
  try {
    const pieces: Piece[] = [];
    for (const piece of object.pieces) pieces.push({ blob: await call.blobs.copy(piece.blob), size: piece.size });
    const copy = { ...object, pieces, modified: thisSecond(), headers: replace ? keptHeaders(call) : object.headers };
    commit(call, copy);
    sendXml(call, 'CopyObjectResult', [
      ['ETag', `"${copy.etag}"`],
      ['LastModified', new Date(copy.modified).toISOString()],
    ]);
  } finally {
    release();
  }
}

/** The bytes from start to end, however many pieces they lie in. */
async function* bytesOf(call: Call, object: StoredObject, { start, end }: Range): AsyncGenerator<Buffer> {
  let offset = 0;
  for (const { blob, size } of object.pieces) {
    const [first, last] = [Math.max(start - offset, 0), Math.min(end - offset, size - 1)];
    if (size > 0 && first < size && last >= first) yield* call.blobs.read(blob, first, last);
    offset += size;
  }
}

async function sendBytes(call: Call, object: StoredObject, range: Range): Promise<void> {
  const release = call.blobs.hold(object.pieces.map((piece) => piece.blob));
  const limit = call.fault?.dropConnectionAfterBytes;
  const bytes = bytesOf(call, object, range);
  try {
    await pipeline(limit === undefined ? bytes : cutAfter(bytes, limit, call.req), call.res);
  } finally {
    release();
  }
}

/** GET and HEAD of an object. */
export async function getObject(call: Call): Promise<void> {
  const object = objectOf(call);
  const headers = describingHeaders(call, object);
  if (isUnchanged(call.req.headers, object)) return sendEmpty(call, 304, { etag: headers.etag ?? '' });
  const range = requestedRange(call.req.headers, object);
  const { start, end } = range ?? { start: 0, end: object.size - 1 };
  if (range) headers['content-range'] = `bytes ${start}-${end}/${object.size}`;
  headers['content-length'] = String(end - start + 1);
  const status = range ? 206 : 200;
  if (call.method === 'HEAD' || object.size === 0) return sendEmpty(call, status, headers);
  if (sendHead(call, status, headers)) await sendBytes(call, object, { start, end });
}

function remove(call: Call, key: string): void {
  if (!bucketOf(call).objects.has(key)) return;
  call.blobs.remove(call.catalogue.record({ does: 'delete', bucket: call.bucket, key }));
}

/** Deleting what is not there succeeds, as in S3. */
export function deleteObject(call: Call): void {
  requireWritable(call.req.headers, bucketOf(call).objects.get(call.key));
  remove(call, call.key);
  sendEmpty(call, 204);
}

/** POST ?delete: up to 1,000 keys. */
export async function deleteObjects(call: Call): Promise<void> {
  bucketOf(call);
  const request = await receiveText(call);
  const keys = inner(request, 'Object').map((object) => text(object, 'Key') ?? '');
  if (keys.length < 1 || keys.length > 1000 || keys.includes('')) throw new StoreError(400, 'MalformedXML', 'Between 1 and 1000 keys.');
  for (const key of keys) remove(call, key);
  const quiet = text(request, 'Quiet') === 'true';
  const deleted = keys.map((key): XmlChild => ['Deleted', [['Key', key]]]);
  sendXml(call, 'DeleteResult', quiet ? [] : deleted);
}
