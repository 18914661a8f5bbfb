import { type Call, headerOf } from './call.ts';
import type { StoredObject } from './entries.ts';
import { StoreError } from './store-error.ts';

const KEPT = ['content-type', 'cache-control', 'content-disposition', 'content-encoding', 'content-language', 'expires'];
/** AWS S3 user guide, "Working with object metadata": user-defined metadata is limited to 2 KB. */
const LARGEST_METADATA = 2048;

function standardHeader(call: Call, name: string): string | undefined {
  const value = headerOf(call, name);
  if (name !== 'content-encoding' || value === undefined) return value;
  // aws-chunked describes the way here, not the object.
  const codings = value.split(',').map((coding) => coding.trim());
  return codings.filter((coding) => coding !== 'aws-chunked').join(',') || undefined;
}

function metadataNames(call: Call): Set<string> {
  const names = [...Object.keys(call.req.headers), ...[...call.query.keys()].map((name) => name.toLowerCase())];
  return new Set(names.filter((name) => name.startsWith('x-amz-meta-')));
}

/** The headers of a request that are kept with the object. */
export function keptHeaders(call: Call): Record<string, string> {
  const kept: Record<string, string> = { 'content-type': 'binary/octet-stream' };
  for (const name of KEPT) {
    const value = standardHeader(call, name);
    if (value !== undefined) kept[name] = value;
  }
  let bytes = 0;
  for (const name of metadataNames(call)) {
    const value = headerOf(call, name) ?? '';
    bytes += name.length - 'x-amz-meta-'.length + value.length;
    kept[name] = value;
  }
  if (bytes > LARGEST_METADATA) throw new StoreError(400, 'MetadataTooLarge', 'At most 2 KB of metadata are kept.');
  return kept;
}

function overrides(call: Call): Record<string, string> {
  const headers: Record<string, string> = {};
  for (const name of KEPT) {
    const text = call.query.get(`response-${name}`);
    if (text === undefined) continue;
    const value = Buffer.from(text, 'utf8').toString('latin1');
    // eslint-disable-next-line no-control-regex -- exactly what must not reach a header
    if (/[\x00-\x1f\x7f]/.test(value)) throw new StoreError(400, 'InvalidArgument', `response-${name} is not a header value.`);
    headers[name] = value;
  }
  return headers;
}

/** Headers of an answer that carries or describes the object. */
export function describingHeaders(call: Call, object: StoredObject): Record<string, string> {
  const headers: Record<string, string> = {
    ...object.headers,
    ...overrides(call),
    etag: `"${object.etag}"`,
    'last-modified': new Date(object.modified).toUTCString(),
    'accept-ranges': 'bytes',
  };
  const { checksum } = object;
  if (checksum && call.req.headers['x-amz-checksum-mode'] === 'ENABLED' && call.req.headers.range === undefined) {
    headers[`x-amz-checksum-${checksum.algorithm}`] = checksum.value;
  }
  return headers;
}
