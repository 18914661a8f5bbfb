import sharp, { type Sharp } from 'sharp';

/** Pixels in memory: 8 bits a channel, sRGB. */
export interface RawPicture {
  data: Buffer;
  width: number;
  height: number;
  channels: 3 | 4;
}

/** Opens pixels in memory for the next step. */
export function fromRaw({ data, width, height, channels }: RawPicture): Sharp {
  return sharp(data, { raw: { width, height, channels } });
}

/** Ends a pipeline in memory. */
export async function toRaw(picture: Sharp): Promise<RawPicture> {
  const { data, info } = await picture.raw().toBuffer({ resolveWithObject: true });
  // Grey pictures come out of the decoder with three channels too.
  return { data, width: info.width, height: info.height, channels: info.channels === 4 ? 4 : 3 };
}

/** Mirrors, then quarter turns clockwise, for each EXIF Orientation (CIPA DC-008, tag 0x0112): sharp mirrors first, whatever is called first. */
const TURNS: Record<number, (picture: Sharp) => Sharp> = {
  2: (picture) => picture.flop(),
  3: (picture) => picture.rotate(180),
  4: (picture) => picture.flip(),
  5: (picture) => picture.flop().rotate(270),
  6: (picture) => picture.rotate(90),
  7: (picture) => picture.flop().rotate(90),
  8: (picture) => picture.rotate(270),
};

/** Turns a picture upright. Done after scaling down, so that a turn never needs the whole original in memory. */
export async function turnUpright(picture: RawPicture, orientation: number): Promise<RawPicture> {
  const turn = TURNS[orientation];
  return turn ? toRaw(turn(fromRaw(picture))) : picture;
}

/** Width and height once upright: orientations 5 to 8 lie on their side. */
export function uprightSize({ width, height, orientation }: { width: number; height: number; orientation: number }): {
  width: number;
  height: number;
} {
  return orientation >= 5 ? { width: height, height: width } : { width, height };
}
