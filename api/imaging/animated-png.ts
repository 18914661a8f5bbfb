const MOST_CHUNKS = 1000;

/**
 * Whether a PNG is animated: it then has an acTL chunk before the first IDAT (PNG third edition, 11.3.6.1). Decoders that
 * know nothing of it show its first picture, so nobody would notice that the rest was dropped.
 * @param readAt Gives so many bytes from a place in the file, or fewer at its end.
 */
export async function isAnimatedPng(readAt: (offset: number, length: number) => Promise<Buffer> | Buffer): Promise<boolean> {
  let at = 8;
  for (let chunk = 0; chunk < MOST_CHUNKS; chunk++) {
    const start = await readAt(at, 8);
    if (start.length < 8) return false;
    const type = start.toString('latin1', 4, 8);
    if (type === 'acTL') return true;
    if (type === 'IDAT' || type === 'IEND') return false;
    at += 12 + start.readUInt32BE(0);
  }
  return false;
}
