import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { authenticate, type StoreKeys } from './authentication.ts';
import type { Blobs } from './blobs.ts';
import type { Call } from './call.ts';
import type { Catalogue } from './catalogue.ts';
import { allowOrigin, answerPreflight } from './cors.ts';
import { cutLine, type Fault, type Faults, lineOf } from './faults.ts';
import { operationFor } from './operations.ts';
import { StoreError } from './store-error.ts';
import { document } from './xml.ts';

/** The body of a refused upload is read and thrown away up to this size, so that the client gets to see the answer. */
const DRAIN_BYTES = 64 * 1024 * 1024;

/** Everything a request is served with. */
export interface House {
  keys: StoreKeys;
  catalogue: Catalogue;
  blobs: Blobs;
  faults: Faults;
  corsOrigins: string[];
  onUnexpected: (error: unknown) => void;
}

interface Target {
  path: string;
  bucket: string;
  key: string;
  query: [string, string][];
}

/** Splits the address by hand: a URL parser would resolve ".." and fold slashes, which are part of keys here. */
function readTarget(address: string): Target {
  const mark = address.indexOf('?');
  const path = mark < 0 ? address : address.slice(0, mark);
  const pairs =
    mark < 0
      ? []
      : address
          .slice(mark + 1)
          .split('&')
          .filter(Boolean);
  try {
    const query = pairs.map((pair): [string, string] => {
      const [name = '', ...value] = pair.split('=');
      return [decodeURIComponent(name), decodeURIComponent(value.join('='))];
    });
    const [bucket = '', ...key] = path.slice(1).split('/');
    return { path, bucket: decodeURIComponent(bucket), key: decodeURIComponent(key.join('/')), query };
  } catch {
    throw new StoreError(400, 'InvalidURI', 'The address is not validly encoded.');
  }
}

/** Node joins repeated headers with commas but for set-cookie, which no signature covers. */
function singleHeaders(req: IncomingMessage): Record<string, string | undefined> {
  return Object.fromEntries(Object.entries(req.headers).map(([name, value]) => [name, Array.isArray(value) ? value.join(',') : value]));
}

async function meet(fault: Fault | undefined, req: IncomingMessage): Promise<void> {
  if (fault?.delayMs) await new Promise((resolve) => setTimeout(resolve, fault.delayMs));
  if (fault?.status) throw new StoreError(fault.status, fault.status === 503 ? 'SlowDown' : 'InternalError', 'Asked to fail.');
  const bodiless = req.method === 'HEAD' || req.method === 'DELETE';
  if (fault?.dropConnectionAfterBytes === undefined || !bodiless) return;
  cutLine(req);
  throw new Error('The connection was cut on purpose.');
}

async function serve(house: House, req: IncomingMessage, res: ServerResponse): Promise<void> {
  const { path, bucket, key, query } = readTarget(req.url ?? '/');
  const method = req.method ?? '';
  const proof = authenticate({ method, path, query, headers: singleHeaders(req) }, house.keys, Date.now());
  const fault = house.faults.take(method, `${bucket}/${key}`);
  await meet(fault, req);
  const { catalogue, blobs, keys } = house;
  const call: Call = { req, res, method, bucket, key, query: new Map(query), proof, fault, catalogue, blobs, region: keys.region };
  await operationFor(call)(call);
}

function drain(req: IncomingMessage, res: ServerResponse): void {
  if (req.complete) return;
  res.setHeader('connection', 'close');
  let bytes = 0;
  req.on('error', () => undefined);
  req.on('data', (chunk: Buffer) => {
    bytes += chunk.length;
    if (bytes > DRAIN_BYTES) cutLine(req);
  });
}

function answerError(house: House, req: IncomingMessage, res: ServerResponse, error: unknown): void {
  const known = error instanceof StoreError ? error : new StoreError(500, 'InternalError', 'The store met an error of its own.');
  const lineCut = (lineOf(req)?.destroyed ?? true) || res.destroyed;
  if (!(error instanceof StoreError) && !lineCut) house.onUnexpected(error);
  if (res.headersSent || lineCut) return void res.destroy();
  drain(req, res);
  for (const [name, value] of Object.entries(known.headers)) res.setHeader(name, value);
  const text = document(
    'Error',
    [
      ['Code', known.code],
      ['Message', known.message],
      ['Region', known.headers['x-amz-bucket-region']],
      ['Resource', req.url?.split('?')[0]],
      ['RequestId', String(res.getHeader('x-amz-request-id'))],
    ],
    false,
  );
  if (req.method === 'HEAD') return void res.writeHead(known.status).end();
  res.writeHead(known.status, { 'content-type': 'application/xml', 'content-length': Buffer.byteLength(text) }).end(text);
}

/** Serves one request from its first byte to its last; never rejects. */
export async function handle(house: House, req: IncomingMessage, res: ServerResponse): Promise<void> {
  res.setHeader('x-amz-request-id', randomUUID());
  const allowed = allowOrigin(req, res, house.corsOrigins);
  if (req.method === 'OPTIONS') return answerPreflight(req, res, allowed);
  try {
    await serve(house, req, res);
  } catch (error) {
    answerError(house, req, res, error);
  }
}
