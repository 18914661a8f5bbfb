import { createHash, createHmac, type Hash, type Hmac } from 'node:crypto';
import http from 'node:http';
import { SignatureV4 } from '@smithy/signature-v4';
import type { RunningStore } from '../../docker-free-dev/s3-store.ts';

export const KEYS = { accessKeyId: 'oriel-tests', secretAccessKey: 'a-secret-of-the-tests' };

/** SHA-256 in the shape the signer asks for. */
export class NodeSha256 {
  private readonly state: Hash | Hmac;

  constructor(secret?: string | ArrayBuffer | ArrayBufferView) {
    this.state = secret === undefined ? createHash('sha256') : createHmac('sha256', secret as string | Buffer);
  }

  update(data: string | Uint8Array): void {
    this.state.update(data);
  }

  async digest(): Promise<Uint8Array> {
    return new Uint8Array(this.state.digest());
  }
}

/** The signer of the AWS SDK, which is not ours: what it signs our store must believe. */
export function signer(credentials = KEYS, region = 'us-east-1'): SignatureV4 {
  return new SignatureV4({ credentials, region, service: 's3', sha256: NodeSha256 as never, uriEscapePath: false, applyChecksum: false });
}

export interface RawRequest {
  method?: string;
  /** As it goes over the wire: percent-encoded, dots and all. */
  path: string;
  query?: Record<string, string>;
  headers?: Record<string, string>;
  body?: string | Buffer;
  credentials?: typeof KEYS;
  region?: string;
  signingDate?: Date;
  /** false: the length is not among the signed headers. */
  signLength?: boolean;
}

export interface RawAnswer {
  status: number;
  headers: http.IncomingHttpHeaders;
  body: Buffer;
  text: string;
}

const sha256 = (data: string | Buffer): string => createHash('sha256').update(data).digest('hex');

const written = (path: string, query: Record<string, string>): string => {
  const pairs = Object.entries(query).map(([name, value]) => `${encodeURIComponent(name)}=${encodeURIComponent(value)}`);
  return pairs.length ? `${path}?${pairs.join('&')}` : path;
};

/** Sends bytes as they are: fetch would fold ".." and choose headers of its own. */
export function send(port: number, request: RawRequest): Promise<RawAnswer> {
  return new Promise((resolve, reject) => {
    const { method = 'GET', path, query = {}, headers = {}, body } = request;
    const options = { host: '127.0.0.1', port, method, path: written(path, query), headers, agent: false };
    const outgoing = http.request(options, (incoming) => {
      const chunks: Buffer[] = [];
      incoming.on('data', (chunk: Buffer) => chunks.push(chunk));
      incoming.once('error', reject);
      incoming.once('end', () => {
        const whole = Buffer.concat(chunks);
        resolve({ status: incoming.statusCode ?? 0, headers: incoming.headers, body: whole, text: whole.toString('utf8') });
      });
    });
    outgoing.once('error', reject);
    outgoing.end(body);
  });
}

/** Headers of a request signed in its Authorization header. */
export async function signHeaders(store: Pick<RunningStore, 'port'>, request: RawRequest): Promise<Record<string, string>> {
  const { method = 'GET', path, query = {}, headers = {}, body = '', credentials = KEYS, region, signingDate, signLength = true } = request;
  const content = { 'x-amz-content-sha256': sha256(body), ...headers };
  const hasLength = signLength && (body !== '' || method === 'PUT');
  const length: Record<string, string> = hasLength ? { 'content-length': String(Buffer.byteLength(body)) } : {};
  const signable = {
    method,
    protocol: 'http:',
    hostname: '127.0.0.1',
    port: store.port,
    path,
    query,
    headers: { host: `127.0.0.1:${store.port}`, ...length, ...content },
  };
  const signed = await signer(credentials, region).sign(signable, { signingDate });
  return signed.headers;
}

/** Signs a request and sends it. */
export async function signed(store: Pick<RunningStore, 'port'>, request: RawRequest): Promise<RawAnswer> {
  return send(store.port, { ...request, headers: await signHeaders(store, request) });
}
