import fs from 'node:fs/promises';
import path from 'node:path';
import sharp from 'sharp';
import { develop, meter } from './develop.ts';
import { intoJpeg, intoTiff } from './exif.ts';
import { evenOut, smear } from './finish.ts';
import type { PlannedFrame, PlannedTake } from './frames.ts';
import { type LinearPicture, render } from './render.ts';
import { subjectOf } from './scene.ts';

/** Share of a frame's pixels that is drawn along each side; the rest is enlarged before the grain is put on. */
const DRAWN_SHARE = 0.5;

/** Draws one take and writes its files into `dir`, each under its own name only once it is whole. */
export async function drawTake(planned: PlannedTake, dir: string, onFrame: (name: string) => void): Promise<void> {
  const { take, scene, width, height } = planned;
  const subject = subjectOf(scene, { step: take.step, roll: take.roll });
  const picture = render(subject, Math.round(width * DRAWN_SHARE), Math.round(height * DRAWN_SHARE));
  if (take.shake) smear(picture, take.shake);
  const factor = meter(picture, subject.light.key);
  for (const frame of planned.frames) {
    const file = path.join(dir, frame.name);
    if (await exists(file)) continue;
    const bytes = await developFrame(picture, frame, factor, subject.light.balance);
    await fs.writeFile(`${file}.part`, bytes);
    await fs.rename(`${file}.part`, file);
    onFrame(frame.name);
  }
}

export async function exists(file: string): Promise<boolean> {
  return fs.access(file).then(
    () => true,
    () => false,
  );
}

async function developFrame(
  picture: LinearPicture,
  frame: PlannedFrame,
  factor: number,
  balance: readonly [number, number, number],
): Promise<Buffer> {
  const { finish, shot } = frame;
  const source = finish ? evenOut(picture, finish.evened) : picture;
  const warm = finish?.warmth ?? 1;
  const { codes } = await develop(
    source,
    {
      factor,
      steps: frame.step,
      balance: [balance[0] * warm, balance[1], balance[2] / warm],
      // Merged from several exposures, a final is as clean as the longest of them.
      sensitivity: finish ? 25 : shot.sensitivity,
      seed: Number(frame.name.slice(3, 7)) * 10 + (finish ? finish.suffix.length : 0),
    },
    frame.width,
    frame.height,
  );
  const raw = { width: frame.width, height: frame.height, channels: 3 as const };
  if (frame.encoding === 'tiff') {
    const tiff = sharp(codes, { raw }).toColourspace('rgb16').withIccProfile('srgb').tiff({ compression: 'lzw', predictor: 'horizontal' });
    return intoTiff(await tiff.toBuffer(), shot);
  }
  const upright = sharp(codes, { raw });
  const stored = shot.orientation === 6 ? upright.rotate(270) : upright;
  const jpeg = stored
    .toColourspace('srgb')
    .withIccProfile(frame.encoding === 'p3' ? 'p3' : 'srgb')
    .jpeg({ quality: 90 });
  return intoJpeg(await jpeg.toBuffer(), shot);
}
