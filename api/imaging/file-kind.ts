import { Refusal } from './refusal.ts';

/** What the first bytes say a file is. `tiff` is any file built on TIFF, raw files among them. */
export type FileKind = 'jpeg' | 'png' | 'webp' | 'avif' | 'tiff';

/** So many bytes from the start of a file are enough for `fileKind`. */
export const HEAD_BYTES = 4096;

const TAKEN = 'Oriel takes JPEG, TIFF, PNG, WebP and AVIF pictures, and raw files built on TIFF, such as DNG.';

interface Signature {
  offset: number;
  bytes: string;
  what: string;
}
/** Files that people drop by mistake. Signatures as listed by the formats' own specifications; `latin1` text. */
const ARCHIVES: Signature[] = [
  { offset: 0, bytes: 'PK\x03\x04', what: 'a zip archive' },
  { offset: 0, bytes: 'PK\x05\x06', what: 'a zip archive' },
  { offset: 0, bytes: '7z\xbc\xaf\x27\x1c', what: 'a 7z archive' },
  { offset: 0, bytes: 'Rar!', what: 'a rar archive' },
  { offset: 0, bytes: '\x1f\x8b', what: 'a gzip archive' },
  { offset: 0, bytes: '\xfd7zXZ', what: 'an xz archive' },
  { offset: 0, bytes: 'BZh', what: 'a bzip2 archive' },
  { offset: 257, bytes: 'ustar', what: 'a tar archive' },
];
const OTHERS: Signature[] = [
  { offset: 0, bytes: '%PDF', what: 'a PDF document' },
  { offset: 0, bytes: '8BPS', what: 'a layered working file (PSD)' },
  { offset: 0, bytes: 'BM', what: 'a BMP picture' },
  { offset: 0, bytes: 'v/1\x01', what: 'an OpenEXR picture' },
  { offset: 0, bytes: '#?RADIANCE', what: 'a Radiance picture' },
  { offset: 0, bytes: '\xff\x0a', what: 'a JPEG XL picture' },
  { offset: 0, bytes: '\x00\x00\x00\x0cJXL ', what: 'a JPEG XL picture' },
  { offset: 0, bytes: '\x00\x00\x00\x0cjP  ', what: 'a JPEG 2000 picture' },
];
const TIFF_STARTS = ['II*\0', 'MM\0*', 'II+\0', 'MM\0+', 'IIRO', 'IIRS', 'MMOR', 'IIU\0'];

function begins(head: Buffer, { offset, bytes }: Pick<Signature, 'offset' | 'bytes'>): boolean {
  return head.subarray(offset, offset + bytes.length).equals(Buffer.from(bytes, 'latin1'));
}

/** Files of the ISO base media kind (AVIF, HEIC, films) tell what they are by the brands in their first box. */
function isoKind(head: Buffer): FileKind {
  const end = Math.min(Math.max(head.readUInt32BE(0), 16), head.length);
  const brands = [head.toString('latin1', 8, 12)];
  for (let at = 16; at + 4 <= end; at += 4) brands.push(head.toString('latin1', at, at + 4));
  if (brands.includes('avis')) throw new Refusal('animated', 'The file is an animated AVIF; single pictures are taken in, films are not.');
  if (brands.includes('avif')) return 'avif';
  if (brands.some((brand) => /^(hei[cxms]|hev[cxms])$/.test(brand))) {
    throw new Refusal('unsupported', `The file is a HEIC picture, which cannot be read here: export it as JPEG or TIFF. ${TAKEN}`);
  }
  if (brands[0] === 'crx ') {
    throw new Refusal('unsupported', `The file is a raw file that is not built on TIFF: export it as DNG, TIFF or JPEG. ${TAKEN}`);
  }
  throw new Refusal('not-a-picture', `The file is a film or another media file, not a picture. ${TAKEN}`);
}

/** Text that begins with "<" is a drawing or a page; both could carry scripts and are never opened. */
function refuseMarkup(head: Buffer): void {
  const utf16 = (head[0] === 0xff && head[1] === 0xfe) || (head[0] === 0x3c && head[1] === 0);
  const text = head.toString(utf16 ? 'utf16le' : 'utf8').replace(/^\ufeff?\s*/, '');
  if (!text.startsWith('<')) return;
  if (/<(\w+:)?svg[\s>]/i.test(text)) throw new Refusal('unsupported', `The file is an SVG drawing, not a photograph. ${TAKEN}`);
  throw new Refusal('not-a-picture', `The file is a web page or an XML document, not a picture. ${TAKEN}`);
}

function refuseKnown(head: Buffer): void {
  const archive = ARCHIVES.find((signature) => begins(head, signature));
  if (archive) throw new Refusal('not-a-picture', `The file is ${archive.what}: unpack it and bring the pictures themselves. ${TAKEN}`);
  if (/^GIF8[79]a$/.test(head.toString('latin1', 0, 6))) {
    throw new Refusal('animated', `The file is a GIF, a format for animations. ${TAKEN}`);
  }
  const other = OTHERS.find((signature) => begins(head, signature));
  if (other) throw new Refusal('unsupported', `The file is ${other.what}. ${TAKEN}`);
  refuseMarkup(head);
}

/**
 * Says what a file is by its first bytes, never by its name.
 * @throws Refusal for everything that is not taken in.
 */
export function fileKind(head: Buffer): FileKind {
  if (head.length === 0) throw new Refusal('empty', 'The file is empty.');
  if (begins(head, { offset: 0, bytes: '\xff\xd8\xff' })) return 'jpeg';
  if (begins(head, { offset: 0, bytes: '\x89PNG\r\n\x1a\n' })) return 'png';
  if (begins(head, { offset: 0, bytes: 'RIFF' }) && begins(head, { offset: 8, bytes: 'WEBP' })) return 'webp';
  if (TIFF_STARTS.some((bytes) => begins(head, { offset: 0, bytes }))) return 'tiff';
  if (begins(head, { offset: 4, bytes: 'ftyp' }) && head.length >= 16) return isoKind(head);
  refuseKnown(head);
  throw new Refusal('not-a-picture', `The file is not a picture. ${TAKEN}`);
}
