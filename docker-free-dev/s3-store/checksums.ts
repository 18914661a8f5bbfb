import { createHash } from 'node:crypto';
import zlib from 'node:zlib';

/** A running checksum; the digest is base64 as in the x-amz-checksum- headers. */
export interface Summer {
  update(chunk: Buffer): void;
  digest(): string;
}

function base64OfWord(word: number): string {
  const buffer = Buffer.alloc(4);
  buffer.writeUInt32BE(word >>> 0);
  return buffer.toString('base64');
}

function crc32(): Summer {
  let crc = 0;
  return { update: (chunk) => void (crc = zlib.crc32(chunk, crc)), digest: () => base64OfWord(crc) };
}

/** Table of CRC-32C (Castagnoli, reflected polynomial 0x82F63B78; RFC 3720 appendix B.4). */
const CASTAGNOLI = Int32Array.from({ length: 256 }, (_, byte) => {
  let crc = byte;
  for (let bit = 0; bit < 8; bit += 1) crc = crc & 1 ? (crc >>> 1) ^ 0x82f63b78 : crc >>> 1;
  return crc;
});

function crc32c(): Summer {
  let crc = -1;
  return {
    update: (chunk) => {
      for (const byte of chunk) crc = (crc >>> 8) ^ (CASTAGNOLI[(crc ^ byte) & 255] ?? 0);
    },
    digest: () => base64OfWord(~crc),
  };
}

function hash(name: string): Summer {
  const running = createHash(name);
  return { update: (chunk) => void running.update(chunk), digest: () => running.digest('base64') };
}

const SUMMERS = new Map<string, () => Summer>([
  ['crc32', crc32],
  ['crc32c', crc32c],
  ['sha1', () => hash('sha1')],
  ['sha256', () => hash('sha256')],
]);

/** Starts the checksum of that name in lower case, or undefined where this store does not know it. */
export function startChecksum(name: string): Summer | undefined {
  return SUMMERS.get(name)?.();
}
