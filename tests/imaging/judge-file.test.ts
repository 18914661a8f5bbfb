import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { deflateSync, crc32 } from 'node:zlib';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { judgeFile, judgeHeader, type JudgedFile } from '../../api/imaging/judge-file.ts';
import { Refusal } from '../../api/imaging/refusal.ts';
import { extract, readTags, writeTags } from '../support/exiftool.ts';
import { photograph } from '../support/photograph.ts';
import { buildDng, buildTiff, pictureEntries } from '../support/tiff-builder.ts';

const LIMITS = { bytes: 500_000_000, pixels: 300_000_000 };
const folder = mkdtempSync(path.join(tmpdir(), 'oriel-judge-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

let jpeg: Buffer;
let png: Buffer;
beforeAll(async () => {
  // With the standard Huffman tables, as cameras write: tables made to measure leave no code unused that would show damage.
  jpeg = await photograph().jpeg({ quality: 90, optimiseCoding: false }).toBuffer();
  png = await photograph(300, 200).png().toBuffer();
});

let counter = 0;
/** Files are named to mislead: the name must not matter. */
function file(bytes: Buffer, name = 'picture.jpg'): string {
  const written = path.join(folder, `${++counter}-${name}`);
  writeFileSync(written, bytes);
  return written;
}
const judge = (bytes: Buffer, limits = LIMITS): Promise<JudgedFile> => judgeFile(file(bytes), limits);

async function refusal(bytes: Buffer, limits = LIMITS): Promise<Refusal> {
  const outcome = await judge(bytes, limits).catch((error: unknown) => error);
  if (!(outcome instanceof Refusal)) throw new Error(`not refused: ${JSON.stringify(outcome)}`);
  // One sentence for a person, or two: no inner words of a decoder.
  expect(outcome.message).toMatch(/^[A-Z].*\.$/);
  expect(outcome.message).not.toMatch(/vips|libjpeg|sharp|undefined|Error/i);
  return outcome;
}

function pngChunk(type: string, data: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const frame = Buffer.alloc(8);
  frame.writeUInt32BE(data.length);
  frame.writeUInt32BE(crc32(body), 4);
  return Buffer.concat([frame.subarray(0, 4), body, frame.subarray(4)]);
}
/** A 1-bit grey PNG whose header claims a size; its pixels are hardly there. */
function pngOf(width: number, height: number): Buffer {
  const header = Buffer.alloc(13);
  header.writeUInt32BE(width);
  header.writeUInt32BE(height, 4);
  header.set([1, 0, 0, 0, 0], 8);
  const pixels = pngChunk('IDAT', deflateSync(Buffer.alloc(1000)));
  return Buffer.concat([png.subarray(0, 8), pngChunk('IHDR', header), pixels, pngChunk('IEND', Buffer.alloc(0))]);
}
/** Where the frame header (SOF0) of a baseline JPEG tells height and width. */
function jpegOf(width: number, height: number): Buffer {
  const patched = Buffer.from(jpeg);
  const at = patched.indexOf(Buffer.from([0xff, 0xc0]));
  patched.writeUInt16BE(height, at + 5);
  patched.writeUInt16BE(width, at + 7);
  return patched;
}
const isoFile = (...brands: string[]) => {
  const box = Buffer.from(`0000ftyp${brands[0]}0000${brands.join('')}`, 'latin1');
  box.writeUInt32BE(box.length);
  box.writeUInt32BE(0, 12);
  return Buffer.concat([box, Buffer.alloc(200)]);
};

describe('what is taken in', () => {
  const writers: [string, () => Promise<Buffer>, Partial<JudgedFile>][] = [
    ['a JPEG', () => photograph().jpeg().toBuffer(), { kind: 'jpeg', mediaType: 'image/jpeg', width: 1200, height: 800 }],
    ['a progressive JPEG', () => photograph().jpeg({ progressive: true }).toBuffer(), { kind: 'jpeg' }],
    ['a grey JPEG', () => photograph().toColourspace('b-w').jpeg().toBuffer(), { kind: 'jpeg' }],
    ['a CMYK JPEG', () => photograph().toColourspace('cmyk').jpeg().toBuffer(), { kind: 'jpeg' }],
    ['a TIFF', () => photograph().tiff({ compression: 'none' }).toBuffer(), { kind: 'tiff', mediaType: 'image/tiff', preview: null }],
    ['an LZW TIFF', () => photograph().tiff({ compression: 'lzw' }).toBuffer(), { kind: 'tiff' }],
    ['a deflate TIFF', () => photograph().tiff({ compression: 'deflate', predictor: 'horizontal' }).toBuffer(), { kind: 'tiff' }],
    ['a tiled big TIFF', () => photograph().tiff({ bigtiff: true, tile: true, compression: 'lzw' }).toBuffer(), { kind: 'tiff' }],
    ['a 16-bit LZW TIFF', () => photograph().toColourspace('rgb16').tiff({ compression: 'lzw' }).toBuffer(), { kind: 'tiff' }],
    ['a 16-bit deflate TIFF', () => photograph().toColourspace('rgb16').tiff({ compression: 'deflate' }).toBuffer(), { kind: 'tiff' }],
    ['a PNG', () => photograph().png().toBuffer(), { kind: 'png', mediaType: 'image/png' }],
    ['a PNG with transparency', () => photograph().ensureAlpha(0.5).png().toBuffer(), { kind: 'png' }],
    ['a palette PNG', () => photograph().png({ palette: true }).toBuffer(), { kind: 'png' }],
    ['a WebP', () => photograph().webp().toBuffer(), { kind: 'webp', mediaType: 'image/webp' }],
    ['a lossless WebP', () => photograph().webp({ lossless: true }).toBuffer(), { kind: 'webp' }],
    ['an AVIF', () => photograph(400, 300).avif({ effort: 0 }).toBuffer(), { kind: 'avif', mediaType: 'image/avif', width: 400 }],
  ];
  it.each(writers)('%s', async (_what, write, expected) => {
    expect(await judge(await write())).toMatchObject({ ...expected, orientation: 1 });
  });

  it('a picture with bytes behind its end, such as a zip', async () => {
    const zip = Buffer.from('504b030414000000000000000000000000000000000000000000000000002e2e2f2e2e2f', 'hex');
    expect(await judge(Buffer.concat([jpeg, Buffer.alloc(5000)]))).toMatchObject({ kind: 'jpeg' });
    expect(await judge(Buffer.concat([jpeg, zip]))).toMatchObject({ kind: 'jpeg' });
  });

  it('a picture with an orientation that does not exist, as upright', async () => {
    const odd = file(jpeg);
    await writeTags(odd, '-n', '-IFD0:Orientation=99');
    expect((await judgeFile(odd, LIMITS)).orientation).toBe(1);
  });

  it('a picture whose EXIF claims 65535 entries', async () => {
    const exif = Buffer.concat([Buffer.from('Exif\0\0II*\0\x08\0\0\0\xff\xff', 'latin1'), Buffer.alloc(400, 7)]);
    const segment = Buffer.alloc(4);
    segment.writeUInt16BE(0xffe1);
    segment.writeUInt16BE(exif.length + 2, 2);
    const patched = Buffer.concat([jpeg.subarray(0, 2), segment, exif, jpeg.subarray(2)]);
    expect(await judge(patched)).toMatchObject({ kind: 'jpeg', orientation: 1 });
  });

  it('a picture at the limit of pixels, not one row beyond', async () => {
    const limits = { ...LIMITS, pixels: 1200 * 800 };
    expect(await judge(jpeg, limits)).toMatchObject({ width: 1200 });
    expect((await refusal(await photograph(1200, 801).jpeg().toBuffer(), limits)).code).toBe('too-many-pixels');
  });
});

describe('what is refused', () => {
  it.each<[string, () => Buffer, string, RegExp]>([
    ['no bytes', () => Buffer.alloc(0), 'empty', /^The file is empty\.$/],
    ['a JPEG cut in half', () => jpeg.subarray(0, jpeg.length / 2), 'damaged', /cut short or damaged/],
    ['a JPEG that lacks its last bytes', () => jpeg.subarray(0, jpeg.length - 400), 'damaged', /cut short/],
    ['a JPEG cut to 200 bytes', () => jpeg.subarray(0, 200), 'damaged', /cut short/],
    ['a JPEG with 200 bytes flipped', () => flipped(jpeg), 'damaged', /damaged/],
    ['a PNG cut in half', () => png.subarray(0, png.length / 2), 'damaged', /cut short/],
    ['a PNG of 2147483647 pixels a side', () => pngOf(0x7fffffff, 0x7fffffff), 'damaged', /damaged/],
    ['a PNG of 60000 pixels a side', () => pngOf(60000, 60000), 'too-many-pixels', /60,000 × 60,000 pixels; at most 300 megapixels/],
    ['a PNG of 20000 pixels a side', () => pngOf(20000, 20000), 'too-many-pixels', /20,000/],
    ['a JPEG of 65500 pixels a side', () => jpegOf(65500, 65500), 'too-many-pixels', /65,500/],
    ['a web page', () => Buffer.from('<!doctype html><html><script>alert(1)</script>'), 'not-a-picture', /web page/],
    ['an SVG', () => Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"><script/></svg>'), 'unsupported', /SVG/],
    [
      'an SVG behind a prolog',
      () => Buffer.from('\ufeff<?xml version="1.0"?>\n<!-- x -->\n<svg width="1e6" height="1e6"/>'),
      'unsupported',
      /SVG/,
    ],
    [
      'an SVG with a name space',
      () => Buffer.from('<?xml version="1.0"?><s:svg xmlns:s="http://www.w3.org/2000/svg"/>'),
      'unsupported',
      /SVG/,
    ],
    ['an SVG in UTF-16', () => Buffer.from('\ufeff<svg xmlns="http://www.w3.org/2000/svg"/>', 'utf16le'), 'unsupported', /SVG/],
    ['a zip', () => Buffer.from('504b0304140000000800', 'hex'), 'not-a-picture', /zip archive: unpack it/],
    ['an empty zip', () => Buffer.from('504b0506000000000000', 'hex'), 'not-a-picture', /zip/],
    ['a 7z archive', () => Buffer.from('377abcaf271c0004', 'hex'), 'not-a-picture', /7z/],
    ['a gzip archive', () => Buffer.from('1f8b0800000000000003', 'hex'), 'not-a-picture', /gzip/],
    ['a PDF', () => Buffer.from('%PDF-1.7\n'), 'unsupported', /PDF/],
    ['a GIF', () => Buffer.from('GIF89a\x01\0\x01\0', 'latin1'), 'animated', /GIF/],
    ['a HEIC picture', () => isoFile('heic', 'mif1', 'heic'), 'unsupported', /HEIC/],
    ['a HEIC picture of the general brand', () => isoFile('mif1', 'mif1', 'heix'), 'unsupported', /HEIC/],
    ['an animated AVIF', () => isoFile('avis', 'avif', 'avis'), 'animated', /animated AVIF/],
    ['a film', () => isoFile('isom', 'mp42'), 'not-a-picture', /film/],
    ['a raw file that is not built on TIFF', () => isoFile('crx ', 'isom'), 'unsupported', /not built on TIFF/],
    ['a JPEG XL picture', () => Buffer.from('ff0a1234', 'hex'), 'unsupported', /JPEG XL/],
    ['text', () => Buffer.from('The harbour at dusk. '.repeat(20)), 'not-a-picture', /not a picture/],
    ['one byte', () => Buffer.from([0xff]), 'not-a-picture', /not a picture/],
  ])('%s', async (_what, make, code, words) => {
    const refused = await refusal(make());
    expect(refused.code).toBe(code);
    expect(refused.message).toMatch(words);
  });

  it('more bytes than an installation takes', async () => {
    const refused = await refusal(jpeg, { ...LIMITS, bytes: 100_000 });
    expect(refused.message).toMatch(/^The file has 0\.\d MB; at most 0\.1 MB are taken in\.$/);
  });

  it('an animated WebP', async () => {
    const frames = await Promise.all([1, 2].map((seed) => photograph(60, 40, seed).png().toBuffer()));
    const animated = await sharp(frames, { join: { animated: true } })
      .webp()
      .toBuffer();
    expect((await refusal(animated)).code).toBe('animated');
  });

  it('an animated PNG', async () => {
    const control = pngChunk('acTL', Buffer.from('0000000200000000', 'hex'));
    // Behind IHDR, which ends at byte 33.
    expect((await refusal(Buffer.concat([png.subarray(0, 33), control, png.subarray(33)]))).code).toBe('animated');
  });

  it('a TIFF of 32 bits a channel', async () => {
    const float = await photograph(60, 40).toColourspace('scrgb').tiff({ compression: 'none' }).toBuffer();
    expect((await sharp(float).metadata()).depth).toBe('float');
    expect((await refusal(float)).message).toContain('16 bits');
  });

  it.each(['none', 'lzw', 'deflate'] as const)('a TIFF (%s) cut in half', async (compression) => {
    const whole = await photograph().tiff({ compression }).toBuffer();
    expect((await refusal(whole.subarray(0, whole.length / 2))).code).toBe('damaged');
  });

  it('a WebP and an AVIF cut in half', async () => {
    const webp = await photograph().webp().toBuffer();
    const avif = await photograph(400, 300).avif({ effort: 0 }).toBuffer();
    for (const whole of [webp, avif]) expect((await refusal(whole.subarray(0, whole.length / 2))).code).toBe('damaged');
  });

  it('a picture of too many pixels from its header alone', async () => {
    await expect(judgeHeader(file(pngOf(60000, 60000)), LIMITS)).rejects.toMatchObject({ code: 'too-many-pixels' });
  });

  it('nothing for a fault of the machine: a file that is not there is an error, not a refusal', async () => {
    await expect(judgeFile(path.join(folder, 'nowhere.jpg'), LIMITS)).rejects.not.toBeInstanceOf(Refusal);
  });
});

function flipped(bytes: Buffer): Buffer {
  const copy = Buffer.from(bytes);
  for (let index = 0; index < 200; index++) {
    const at = Math.floor(copy.length * 0.3) + index;
    copy[at] = (copy[at] ?? 0) ^ 0xff;
  }
  return copy;
}

describe('raw files built on TIFF', () => {
  it('are taken by the preview that exiftool finds too', async () => {
    const preview = await photograph().jpeg().toBuffer();
    const dng = file(buildDng(preview, { orientation: 6 }), 'HL_0412.dng');
    const tags = await readTags(dng);
    expect(tags['File:MIMEType'] ?? tags['File:FileType']).toBeDefined();
    const judged = await judgeFile(dng, LIMITS);
    expect(judged).toMatchObject({ kind: 'raw', mediaType: 'image/x-dng', width: 1200, height: 800, orientation: 6 });
    const { span } = judged.preview ?? { span: { offset: 0, length: 0 } };
    const bytes = buildDng(preview, { orientation: 6 }).subarray(span.offset, span.offset + span.length);
    expect(bytes.equals(preview)).toBe(true);
    expect((await extract(dng, 'PreviewImage')).equals(preview)).toBe(true);
  });

  it('are taken by the largest of several previews, also where tags 513 and 514 name it', async () => {
    const [small, large] = [await photograph(700, 460).jpeg().toBuffer(), await photograph(1300, 860).jpeg().toBuffer()];
    const raw = buildTiff({
      entries: pictureEntries({ width: 160, height: 120, compression: 1, photometric: 2, subfile: 1, orientation: 8 }),
      strip: Buffer.alloc(160 * 120 * 3),
      children: [
        { entries: pictureEntries({ width: 700, height: 460, compression: 6, photometric: 6 }), jpeg: small },
        { entries: pictureEntries({ width: 1300, height: 860, compression: 6, photometric: 6 }), jpeg: large },
        { entries: pictureEntries({ width: 1400, height: 900, compression: 34713, photometric: 32803 }), strip: Buffer.alloc(9000, 3) },
      ],
    });
    expect(await judge(raw)).toMatchObject({ kind: 'raw', mediaType: 'image/x-raw', width: 1300, height: 860, orientation: 8 });
  });

  it('do not turn a preview that stands upright already', async () => {
    const upright = await photograph(800, 1200).jpeg().toBuffer();
    expect(await judge(buildDng(upright, { orientation: 6 }))).toMatchObject({ width: 800, height: 1200, orientation: 1 });
  });

  it('are refused without a preview, with a thumbnail only, and cut short', async () => {
    const sensor = {
      entries: pictureEntries({ width: 1400, height: 900, compression: 1, photometric: 32803 }),
      strip: Buffer.alloc(1400 * 900),
    };
    expect((await refusal(buildTiff(sensor))).code).toBe('no-preview');
    expect((await refusal(buildDng(await photograph(160, 120).jpeg().toBuffer()))).code).toBe('no-preview');
    const whole = buildTiff({ ...sensor, jpeg: await photograph().jpeg().toBuffer() });
    expect(await judge(whole)).toMatchObject({ kind: 'raw' });
    const dng = buildDng(await photograph().jpeg().toBuffer());
    // The directories stand at the end of these files, so a cut leaves no way to any of them.
    expect((await refusal(dng.subarray(0, dng.length - 3000))).code).toBe('damaged');
    const away = Buffer.from(whole);
    away.writeUInt32LE(away.length + 5, away.indexOf(Buffer.from([0x11, 1, 4, 0, 1, 0, 0, 0])) + 8);
    expect((await refusal(away)).message).toContain('cut short');
  });

  it('are refused where the preview itself is cut', async () => {
    const preview = await photograph().jpeg().toBuffer();
    expect((await refusal(buildDng(preview.subarray(0, preview.length / 2)))).code).toBe('damaged');
  });

  it('cannot send the reader in circles', async () => {
    const loop = buildDng(await photograph().jpeg().toBuffer());
    // The first directory names itself as the next one.
    const first = loop.readUInt32LE(4);
    loop.writeUInt32LE(first, first + 2 + loop.readUInt16LE(first) * 12);
    expect(await judge(loop)).toMatchObject({ kind: 'raw' });
  });
});
