import { byteLength } from './file-names.ts';

/** An entry of a stored (not deflated) archive. `name` is the whole path inside, `size` the bytes of the file. */
export interface ZipEntrySize {
  name: string;
  size: number;
}

/**
 * Two ways of writing the ZIP64 parts of a streamed archive. Both are read by every tool tried.
 * - `local-extra`: as APPNOTE 6.3.10 §4.3.9.2 asks, a large entry says so in its local header, and its central record
 *   carries only the fields that need it.
 * - `central-extra`: as npm archiver 8 writes, no local extra, and always three fields (28 bytes) in the central record.
 */
export type ZipStyle = 'local-extra' | 'central-extra';

/** Sizes and offsets from here on need ZIP64 (APPNOTE §4.4.1.4: 0xFFFFFFFF marks "look in the extra field"). */
const LIMIT_32 = 0xffffffff;
const LIMIT_16 = 0xffff;

/** APPNOTE 6.3.10: §4.3.7, §4.3.12, §4.3.14, §4.3.15, §4.3.16, §4.3.9. */
const LOCAL_HEADER = 30;
const CENTRAL_HEADER = 46;
const ZIP64_END = 56 + 20;
const END = 22;
const DESCRIPTOR = 16;
const DESCRIPTOR_64 = 24;

/** archiver asks for more than the limit, the standard for the limit itself; no file of ours is ever exactly 4 GiB − 1. */
function beyond(value: number, limit: number, style: ZipStyle): boolean {
  return style === 'central-extra' ? value > limit : value >= limit;
}

function centralExtra(large: boolean, far: boolean, style: ZipStyle): number {
  if (!large && !far) return 0;
  return style === 'central-extra' ? 28 : 4 + (large ? 16 : 0) + (far ? 8 : 0);
}

/**
 * The exact length in bytes of a stored archive whose entries were streamed (a data descriptor after each), known before a
 * byte is written. `buffered` names entries given as a whole, which carry no descriptor.
 */
export function zipLength(
  entries: readonly ZipEntrySize[],
  options: { style?: ZipStyle; buffered?: (entry: ZipEntrySize) => boolean } = {},
): number {
  const style = options.style ?? 'central-extra';
  let offset = 0;
  let central = 0;
  for (const entry of entries) {
    const name = byteLength(entry.name);
    const large = beyond(entry.size, LIMIT_32, style);
    const descriptor = options.buffered?.(entry) ? 0 : large ? DESCRIPTOR_64 : DESCRIPTOR;
    central += CENTRAL_HEADER + name + centralExtra(large, beyond(offset, LIMIT_32, style), style);
    offset += LOCAL_HEADER + name + (large && style === 'local-extra' ? 20 : 0) + entry.size + descriptor;
  }
  const zip64 = beyond(entries.length, LIMIT_16, style) || beyond(central, LIMIT_32, style) || beyond(offset, LIMIT_32, style);
  return offset + central + (zip64 ? ZIP64_END : 0) + END;
}
