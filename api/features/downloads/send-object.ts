import type { Request, Response } from 'express';
import { contentRange, readRange, unsatisfiedRange, type ByteRange } from '../../domain/byte-ranges.ts';
import { problem } from '../../middleware/problem.ts';
import type { Store } from '../../services/storage.ts';
import { attachmentName } from './attachment-name.ts';
import { judgeConditions, rangeHolds, type Validators } from './conditions.ts';
import { partsOf, type Parts } from './multipart-ranges.ts';
import { pour } from './pour.ts';

/** An object of the store as a download: what the row says of it. The bytes never change under one SHA-256. */
export interface StoredObject {
  key: string;
  size: number;
  sha256: string;
  modified: Date;
  /** What it is saved as. */
  name: string;
  mediaType: string;
}

/** Hears what of an object goes out, so that it can be written down. */
export interface TransferWatch {
  /** Before the first byte: the ranges that will be sent. */
  begin?(ranges: readonly ByteRange[]): Promise<void> | void;
  /** Bytes handed to the connection, by their place in the object; may be called many times. */
  sent?(range: ByteRange): void;
  /** After the last byte, or when the line broke. */
  end?(): Promise<void> | void;
}

/**
 * Serves an object of the store by RFC 9110: exact length, strong ETag, Last-Modified, conditions (§13), one range or
 * several (§14), HEAD. Streams with a ranged GET and stops reading when the client goes. Private, never stored by caches.
 * @throws Problem 412, 416, or 503 where the store does not answer
 */
export async function sendObject(
  req: Request,
  res: Response,
  store: Pick<Store, 'get'>,
  object: StoredObject,
  watch: TransferWatch = {},
): Promise<void> {
  const validators: Validators = { etag: `"${object.sha256}"`, modified: object.modified };
  res.set({ ETag: validators.etag, 'Cache-Control': 'private, no-store', 'X-Content-Type-Options': 'nosniff' });
  res.set({ 'Accept-Ranges': 'bytes', 'Last-Modified': object.modified.toUTCString(), 'Cross-Origin-Resource-Policy': 'same-origin' });
  const verdict = judgeConditions(req.headers, validators);
  if (verdict === 'failed') throw problem(412, 'The file is not the one you began with any more.');
  if (verdict === 'not-modified') return void res.status(304).end();
  const wanted =
    req.method === 'GET' && rangeHolds(req.headers, validators)
      ? readRange(req.header('range'), object.size)
      : ({ kind: 'whole' } as const);
  if (wanted.kind === 'unsatisfiable') {
    res.set('Content-Range', unsatisfiedRange(object.size));
    throw problem(416, `The file has ${object.size} bytes; the part you asked for begins behind its end.`);
  }
  const parts = partsOf(wanted.kind === 'ranges' ? wanted.ranges : null, object);
  head(res, parts, object);
  if (req.method === 'HEAD') return void res.end();
  await pour(res, store, object, parts, watch);
}

function head(res: Response, parts: Parts, object: StoredObject): void {
  res.status(parts.partial ? 206 : 200);
  res.set('Content-Type', parts.boundary ? `multipart/byteranges; boundary=${parts.boundary}` : object.mediaType);
  const [only] = parts.list;
  if (parts.partial && !parts.boundary && only) res.set('Content-Range', contentRange(only.range, object.size));
  res.set({ 'Content-Length': String(parts.length), 'Content-Disposition': attachmentName(object.name) });
}
