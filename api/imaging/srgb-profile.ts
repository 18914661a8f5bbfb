import { createHash } from 'node:crypto';
import { crc32, deflateSync } from 'node:zlib';
import { LRUCache } from 'lru-cache';
import sharp from 'sharp';

/** Tones of each channel that are tried. */
const TONES = [0, 16, 32, 64, 96, 128, 160, 192, 224, 255];
/** Levels of 255 that a colour may come out differently: tables of sRGB by several makers differ by as much near black. */
const TOLERANCE = 2;
/** Bytes of a PNG up to the end of its header, behind which other chunks may stand (W3C PNG, section 5). */
const HEADER = 33;

const CUBE = Buffer.from(TONES.flatMap((red) => TONES.flatMap((green) => TONES.flatMap((blue) => [red, green, blue]))));
const SIDE = { width: TONES.length ** 2, height: TONES.length, channels: 3 } as const;

function chunk(type: string, data: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), data]);
  const [length, check] = [Buffer.alloc(4), Buffer.alloc(4)];
  length.writeUInt32BE(data.length);
  check.writeUInt32BE(crc32(body));
  return Buffer.concat([length, body, check]);
}

/** The cube of colours as a PNG that carries the profile. */
async function cubeWith(profile: Buffer): Promise<Buffer> {
  const png = await sharp(CUBE, { raw: SIDE }).png().toBuffer();
  const embedded = chunk('iCCP', Buffer.concat([Buffer.from('profile\0\0', 'latin1'), deflateSync(profile)]));
  return Buffer.concat([png.subarray(0, HEADER), embedded, png.subarray(HEADER)]);
}

async function compare(profile: Buffer): Promise<boolean> {
  try {
    const converted = await sharp(await cubeWith(profile))
      .toColourspace('srgb')
      .raw()
      .toBuffer();
    return converted.length === CUBE.length && converted.every((tone, at) => Math.abs(tone - (CUBE[at] ?? 0)) <= TOLERANCE);
  } catch {
    return false;
  }
}

const known = new LRUCache<string, Promise<boolean>>({ max: 200 });

/**
 * Whether an embedded profile says no more than sRGB: the colour engine itself is asked, on a cube of 1000 colours, and none may come out more
 * than two levels apart. Converting a picture from such a profile would change nothing and take most of the time of its decoding.
 * What is no profile of red, green and blue (ICC.1, header, bytes 16 to 19) is never sRGB.
 */
export function isSrgbProfile(profile: Buffer): Promise<boolean> {
  if (profile.toString('latin1', 16, 20) !== 'RGB ') return Promise.resolve(false);
  const name = createHash('sha256').update(profile).digest('hex');
  const answer = known.get(name) ?? compare(profile);
  known.set(name, answer);
  return answer;
}
