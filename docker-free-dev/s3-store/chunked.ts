import { createHash, timingSafeEqual } from 'node:crypto';
import { type ChunkSigning, chunkSignature, trailerSignature } from './signature.ts';
import { StoreError } from './store-error.ts';

const LONGEST_LINE = 8 * 1024;

/** Reads lines and counted bytes from a stream of buffers without holding more than the buffer in hand. */
class Reader {
  private buffer: Buffer = Buffer.alloc(0);
  private readonly source: AsyncIterator<Buffer>;

  constructor(source: AsyncIterable<Buffer>) {
    this.source = source[Symbol.asyncIterator]();
  }

  private async more(): Promise<void> {
    const { done, value } = await this.source.next();
    if (done) throw new StoreError(400, 'IncompleteBody', 'The body ended before its last chunk.');
    this.buffer = this.buffer.length ? Buffer.concat([this.buffer, value]) : value;
  }

  async line(): Promise<string> {
    for (;;) {
      const end = this.buffer.indexOf('\r\n');
      if (end > LONGEST_LINE || (end < 0 && this.buffer.length > LONGEST_LINE)) throw malformed();
      if (end >= 0) {
        const line = this.buffer.toString('latin1', 0, end);
        this.buffer = this.buffer.subarray(end + 2);
        return line;
      }
      await this.more();
    }
  }

  /** Some bytes, at least one and at most `most`. */
  async some(most: number): Promise<Buffer> {
    if (!this.buffer.length) await this.more();
    const piece = this.buffer.subarray(0, most);
    this.buffer = this.buffer.subarray(piece.length);
    return piece;
  }
}

const malformed = () => new StoreError(400, 'InvalidChunkSizeError', 'The body is not aws-chunked.');

function parseChunkHeader(line: string): { size: number; signature: string | undefined } {
  const [hex = '', ...extensions] = line.split(';');
  if (!/^[0-9a-fA-F]{1,10}$/.test(hex)) throw malformed();
  const signature = extensions.map((part) => /^chunk-signature=([0-9a-f]{64})$/.exec(part)?.[1]).find(Boolean);
  return { size: parseInt(hex, 16), signature };
}

function requireSame(expected: string, given: string | undefined, what: string): void {
  const same = given?.length === expected.length && timingSafeEqual(Buffer.from(given), Buffer.from(expected));
  if (!same) throw new StoreError(403, 'SignatureDoesNotMatch', `The signature of ${what} does not match.`);
}

/** Trailing headers up to the empty line, checked against their signature where the stream is signed. */
async function readTrailers(reader: Reader, signing: ChunkSigning | null, previous: string): Promise<Map<string, string>> {
  const trailers = new Map<string, string>();
  for (let line = await reader.line(); line !== ''; line = await reader.line()) {
    const colon = line.indexOf(':');
    if (colon < 1 || trailers.size > 8) throw malformed();
    trailers.set(line.slice(0, colon).trim().toLowerCase(), line.slice(colon + 1).trim());
  }
  const signature = trailers.get('x-amz-trailer-signature');
  trailers.delete('x-amz-trailer-signature');
  if (signing && trailers.size > 0) {
    const canonical = [...trailers].map(([name, value]) => `${name}:${value}\n`).join('');
    requireSame(trailerSignature(signing, previous, canonical), signature, 'the trailing headers');
  }
  return trailers;
}

/**
 * Decodes an aws-chunked body and checks the chain of signatures of a signed one.
 * @param trailers receives the trailing headers once the stream has ended.
 */
export async function* decodeChunks(
  body: AsyncIterable<Buffer>,
  signing: ChunkSigning | null,
  trailers: Map<string, string>,
): AsyncGenerator<Buffer> {
  const reader = new Reader(body);
  let previous = signing?.seed ?? '';
  for (;;) {
    const { size, signature } = parseChunkHeader(await reader.line());
    const hash = createHash('sha256');
    for (let left = size; left > 0;) {
      const piece = await reader.some(left);
      left -= piece.length;
      if (signing) hash.update(piece);
      yield piece;
    }
    if (signing) {
      const expected = chunkSignature(signing, previous, hash.digest('hex'));
      requireSame(expected, signature, 'a chunk');
      previous = expected;
    }
    if (size === 0) {
      for (const [name, value] of await readTrailers(reader, signing, previous)) trailers.set(name, value);
      return;
    }
    if ((await reader.line()) !== '') throw malformed();
  }
}
