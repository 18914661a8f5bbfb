import { timingSafeEqual } from 'node:crypto';
import {
  ALGORITHM,
  canonicalRequest,
  type ChunkSigning,
  requestSignature,
  type Scope,
  signingKey,
  type SignableRequest,
  UNSIGNED_PAYLOAD,
} from './signature.ts';
import { StoreError } from './store-error.ts';

const SKEW_MS = 15 * 60 * 1000;
const LONGEST_PRESIGNED_SECONDS = 604_800;

/** The one pair of keys this store knows. */
export interface StoreKeys {
  accessKeyId: string;
  secretAccessKey: string;
  region: string;
}

/** A request before anybody believed it. */
export type UnprovenRequest = Pick<SignableRequest, 'method' | 'path' | 'query' | 'headers'>;

/** What a proven request says about its body. */
export interface Proof {
  contentSha256: string;
  signing: ChunkSigning;
}

interface Claim {
  presigned: boolean;
  credential: string;
  signedHeaders: string[];
  signature: string;
  date: string;
}

const HEADER = new RegExp(`^${ALGORITHM} +Credential=([^,\\s]+),\\s*SignedHeaders=([^,\\s]+),\\s*Signature=([0-9a-f]{64})$`);

function readClaim(request: UnprovenRequest): Claim {
  const { authorization } = request.headers;
  const query = new Map(request.query);
  if (authorization !== undefined) {
    const [, credential, signed, signature] = HEADER.exec(authorization) ?? [];
    if (!credential || !signed || !signature) throw new StoreError(400, 'AuthorizationHeaderMalformed');
    return { presigned: false, credential, signedHeaders: signed.split(';'), signature, date: request.headers['x-amz-date'] ?? '' };
  }
  const signature = query.get('X-Amz-Signature');
  if (signature === undefined) throw new StoreError(403, 'AccessDenied', 'Anonymous access is refused.');
  if (query.get('X-Amz-Algorithm') !== ALGORITHM || !/^[0-9a-f]{64}$/.test(signature)) {
    throw new StoreError(400, 'AuthorizationQueryParametersError');
  }
  const signedHeaders = (query.get('X-Amz-SignedHeaders') ?? '').split(';');
  return {
    presigned: true,
    credential: query.get('X-Amz-Credential') ?? '',
    signedHeaders,
    signature,
    date: query.get('X-Amz-Date') ?? '',
  };
}

/** Milliseconds of a date such as 20130524T000000Z; NaN where it is none. */
function parseDate(date: string): number {
  const [, year, month, day, hour, minute, second] = /^(\d{4})(\d\d)(\d\d)T(\d\d)(\d\d)(\d\d)Z$/.exec(date) ?? [];
  return Date.parse(`${year}-${month}-${day}T${hour}:${minute}:${second}Z`);
}

function checkTime(claim: Claim, query: Map<string, string>, now: number): void {
  const signedAt = parseDate(claim.date);
  if (Number.isNaN(signedAt)) throw new StoreError(403, 'AccessDenied', 'A valid x-amz-date is required.');
  if (!claim.presigned) {
    if (Math.abs(now - signedAt) > SKEW_MS) throw new StoreError(403, 'RequestTimeTooSkewed', 'The clocks differ by more than 15 minutes.');
    return;
  }
  const seconds = Number(query.get('X-Amz-Expires'));
  if (!(Number.isInteger(seconds) && seconds >= 1 && seconds <= LONGEST_PRESIGNED_SECONDS)) {
    throw new StoreError(400, 'AuthorizationQueryParametersError', 'X-Amz-Expires must be between 1 and 604800 seconds.');
  }
  if (signedAt - now > SKEW_MS) throw new StoreError(403, 'AccessDenied', 'Request is not yet valid.');
  if (now > signedAt + seconds * 1000) throw new StoreError(403, 'AccessDenied', 'Request has expired.');
}

function checkScope(claim: Claim, keys: StoreKeys): Scope {
  const [accessKeyId, day = '', region = '', service, end, ...more] = claim.credential.split('/');
  if (accessKeyId !== keys.accessKeyId) throw new StoreError(403, 'InvalidAccessKeyId', 'The access key is not known here.');
  if (service !== 's3' || end !== 'aws4_request' || more.length > 0 || !claim.date.startsWith(day) || day.length !== 8) {
    throw new StoreError(400, 'AuthorizationHeaderMalformed', 'The credential scope is not valid.');
  }
  if (region !== keys.region) {
    const message = `The region '${region}' is wrong; expecting '${keys.region}'`;
    throw new StoreError(400, 'AuthorizationHeaderMalformed', message, { 'x-amz-bucket-region': keys.region });
  }
  return { day, region };
}

/** Every x-amz- header must be signed, else somebody on the way could add one. */
function checkSignedHeaders(claim: Claim, headers: UnprovenRequest['headers']): void {
  if (!claim.signedHeaders.includes('host')) throw new StoreError(403, 'AccessDenied', 'The host header must be signed.');
  for (const name of Object.keys(headers)) {
    const exempt = claim.presigned && name === 'x-amz-content-sha256';
    if (name.startsWith('x-amz-') && !exempt && !claim.signedHeaders.includes(name)) {
      throw new StoreError(403, 'AccessDenied', `There were headers present in the request which were not signed: ${name}`);
    }
  }
}

function claimedContent(claim: Claim, request: UnprovenRequest, query: Map<string, string>): string {
  const header = request.headers['x-amz-content-sha256'];
  if (claim.presigned) return header ?? query.get('X-Amz-Content-Sha256') ?? UNSIGNED_PAYLOAD;
  if (header === undefined) throw new StoreError(400, 'InvalidRequest', 'Missing required header: x-amz-content-sha256');
  return header;
}

/**
 * Believes a request or refuses it.
 * @param now milliseconds since 1970
 * @throws StoreError for anonymous, unknown, skewed, expired and wrongly signed requests.
 */
export function authenticate(request: UnprovenRequest, keys: StoreKeys, now: number): Proof {
  const query = new Map(request.query);
  const claim = readClaim(request);
  const scope = checkScope(claim, keys);
  checkTime(claim, query, now);
  checkSignedHeaders(claim, request.headers);
  const contentSha256 = claimedContent(claim, request, query);
  const key = signingKey(keys.secretAccessKey, scope);
  const unsigned = request.query.filter(([name]) => name !== 'X-Amz-Signature');
  const canonical = canonicalRequest({ ...request, query: unsigned, signedHeaders: claim.signedHeaders, contentSha256 });
  const expected = requestSignature(key, claim.date, scope, canonical);
  if (!timingSafeEqual(Buffer.from(expected, 'hex'), Buffer.from(claim.signature, 'hex'))) {
    throw new StoreError(
      403,
      'SignatureDoesNotMatch',
      'The request signature does not match. Check the secret key and the signing method.',
    );
  }
  return { contentSha256, signing: { key, date: claim.date, scope, seed: expected } };
}
