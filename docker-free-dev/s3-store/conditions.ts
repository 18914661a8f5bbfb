import type { IncomingHttpHeaders } from 'node:http';
import type { StoredObject } from './entries.ts';
import { StoreError } from './store-error.ts';

const tags = (header: string): string[] => header.split(',').map((tag) => tag.trim().replace(/^W\//, '').replaceAll('"', ''));
const matches = (header: string, etag: string): boolean => header.trim() === '*' || tags(header).includes(etag);
const failed = () => new StoreError(412, 'PreconditionFailed', 'At least one of the preconditions did not hold.');

/**
 * If-Match and If-None-Match of a writing request (RFC 9110 13.1). Call it right before the change as well: while the
 * body was coming in, somebody else may have written.
 */
export function requireWritable(headers: IncomingHttpHeaders, current: StoredObject | undefined): void {
  const [match, noneMatch] = [headers['if-match'], headers['if-none-match']];
  if (match !== undefined && !current) throw new StoreError(404, 'NoSuchKey', 'The specified key does not exist.');
  if (match !== undefined && current && !matches(match, current.etag)) throw failed();
  if (noneMatch !== undefined && current && matches(noneMatch, current.etag)) throw failed();
}

/**
 * Preconditions of a reading request in the order of RFC 9110 13.2.2.
 * @returns true where the answer is 304.
 */
export function isUnchanged(headers: IncomingHttpHeaders, object: StoredObject): boolean {
  const [match, noneMatch] = [headers['if-match'], headers['if-none-match']];
  if (match !== undefined && !matches(match, object.etag)) throw failed();
  const unmodified = Date.parse(headers['if-unmodified-since'] ?? '');
  if (match === undefined && unmodified < object.modified) throw failed();
  if (noneMatch !== undefined) return matches(noneMatch, object.etag);
  return Date.parse(headers['if-modified-since'] ?? '') >= object.modified;
}

export interface Range {
  /** first byte */
  start: number;
  /** last byte, included */
  end: number;
}

/** If-Range (RFC 9110 13.1.5): a part only of the very version the client already has a part of. */
function rangeStillMeant(ifRange: string | undefined, object: StoredObject): boolean {
  if (ifRange === undefined) return true;
  if (ifRange.startsWith('"')) return ifRange === `"${object.etag}"`;
  return Date.parse(ifRange) === object.modified;
}

/**
 * The single range asked for, or null where the whole object goes out: no, several or unreadable ranges.
 * @throws StoreError 416 where the object has none of the bytes asked for
 */
export function requestedRange(headers: IncomingHttpHeaders, object: StoredObject): Range | null {
  const [, first = '', last = ''] = /^bytes=(\d*)-(\d*)$/.exec(headers.range ?? '') ?? [];
  if ((first === '' && last === '') || !rangeStillMeant(headers['if-range']?.toString(), object)) return null;
  const start = first === '' ? Math.max(0, object.size - Number(last)) : Number(first);
  const end = first === '' || last === '' ? object.size - 1 : Math.min(Number(last), object.size - 1);
  if (first !== '' && last !== '' && Number(first) > Number(last)) return null;
  if (start >= object.size) {
    const headers = { 'content-range': `bytes */${object.size}` };
    throw new StoreError(416, 'InvalidRange', 'The requested range is not satisfiable.', headers);
  }
  return { start, end };
}
