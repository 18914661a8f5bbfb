import { createHash, createHmac } from 'node:crypto';

/*
 * AWS Signature Version 4 as S3 uses it (AWS S3 API reference, "Authenticating Requests"): pure computations.
 * S3 does not normalise paths: "a//b/../c" is signed as it stands.
 */

export const ALGORITHM = 'AWS4-HMAC-SHA256';
export const UNSIGNED_PAYLOAD = 'UNSIGNED-PAYLOAD';

/** The parts of a request that are signed. */
export interface SignableRequest {
  method: string;
  /** Path as it came over the wire, percent-encoded. */
  path: string;
  /** Decoded pairs of the query, in any order, without X-Amz-Signature. */
  query: [name: string, value: string][];
  /** Lower-case names. */
  headers: Record<string, string | undefined>;
  signedHeaders: string[];
  /** Hash of the body in hex, or one of the agreed words such as UNSIGNED-PAYLOAD. */
  contentSha256: string;
}

/** Day, region and service a signature is good for. */
export interface Scope {
  day: string;
  region: string;
}

export const sha256 = (data: string | Buffer): string => createHash('sha256').update(data).digest('hex');
const hmac = (key: string | Buffer, data: string): Buffer => createHmac('sha256', key).update(data).digest();

/** Percent-encoding of RFC 3986: all but unreserved characters. */
export function uriEncode(text: string): string {
  return encodeURIComponent(text).replace(/[!'()*]/g, (character) => `%${character.charCodeAt(0).toString(16).toUpperCase()}`);
}

const byCodePoint = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

function canonicalQuery(query: SignableRequest['query']): string {
  return query
    .map(([name, value]): [string, string] => [uriEncode(name), uriEncode(value)])
    .sort((a, b) => byCodePoint(a[0], b[0]) || byCodePoint(a[1], b[1]))
    .map((pair) => pair.join('='))
    .join('&');
}

/** Node hands headers over as latin1; they are signed as the bytes that were sent. */
function canonicalHeader(value: string | undefined): string {
  return Buffer.from(value ?? '', 'latin1')
    .toString('utf8')
    .trim()
    .replace(/ +/g, ' ');
}

/** @throws URIError where the path is not validly percent-encoded. */
export function canonicalRequest(request: SignableRequest): string {
  return [
    request.method,
    request.path
      .split('/')
      .map((segment) => uriEncode(decodeURIComponent(segment)))
      .join('/'),
    canonicalQuery(request.query),
    ...request.signedHeaders.map((name) => `${name}:${canonicalHeader(request.headers[name])}`),
    '',
    request.signedHeaders.join(';'),
    request.contentSha256,
  ].join('\n');
}

export const scopeText = (scope: Scope): string => `${scope.day}/${scope.region}/s3/aws4_request`;

/** Key derived from the secret for one day and region. */
export function signingKey(secret: string, scope: Scope): Buffer {
  return [scope.day, scope.region, 's3', 'aws4_request'].reduce<Buffer>((key, step) => hmac(key, step), Buffer.from(`AWS4${secret}`));
}

/** Signature in hex of a canonical request. @param date as in x-amz-date: 20130524T000000Z */
export function requestSignature(key: Buffer, date: string, scope: Scope, canonical: string): string {
  return hmac(key, [ALGORITHM, date, scopeText(scope), sha256(canonical)].join('\n')).toString('hex');
}

/** What the signatures of a signed stream's chunks and trailer go on from. */
export interface ChunkSigning {
  key: Buffer;
  date: string;
  scope: Scope;
  /** Signature of the request's header, the first link of the chain. */
  seed: string;
}

/** Signature in hex of one chunk ("Signature Calculations for the Authorization Header: Transferring Payload in Multiple Chunks"). */
export function chunkSignature(signing: ChunkSigning, previous: string, chunkSha256: string): string {
  const lines = [`${ALGORITHM}-PAYLOAD`, signing.date, scopeText(signing.scope), previous, sha256(''), chunkSha256];
  return hmac(signing.key, lines.join('\n')).toString('hex');
}

/** Signature in hex of the trailing headers, each as "name:value\n". */
export function trailerSignature(signing: ChunkSigning, previous: string, trailer: string): string {
  const lines = ['AWS4-HMAC-SHA256-TRAILER', signing.date, scopeText(signing.scope), previous, sha256(trailer)];
  return hmac(signing.key, lines.join('\n')).toString('hex');
}
