import type { FileHandle } from 'node:fs/promises';

const MOST_CHUNKS = 1000;

/**
 * Whether a PNG is animated: it then has an acTL chunk before the first IDAT (PNG third edition, 11.3.6.1). Decoders that
 * know nothing of it show its first picture, so nobody would notice that the rest was dropped.
 */
export async function isAnimatedPng(file: FileHandle): Promise<boolean> {
  let at = 8;
  for (let chunk = 0; chunk < MOST_CHUNKS; chunk++) {
    const { buffer, bytesRead } = await file.read(Buffer.alloc(8), 0, 8, at);
    if (bytesRead < 8) return false;
    const type = buffer.toString('latin1', 4, 8);
    if (type === 'acTL') return true;
    if (type === 'IDAT' || type === 'IEND') return false;
    at += 12 + buffer.readUInt32BE(0);
  }
  return false;
}
