import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { ssim } from 'ssim.js';
import { fromRaw, toRaw, type RawPicture } from '../../api/imaging/upright.ts';

/* eslint-disable @typescript-eslint/no-explicit-any -- the package's own types do not know MergeMertens */
let cv: any;
/** Loads OpenCV (npm @techstark/opencv-js 4.12.0-release.1), once. */
export async function openOpenCv(): Promise<void> {
  cv = createRequire(import.meta.url)('@techstark/opencv-js');
  // What it exports waits for itself for ever when it is awaited.
  if (!cv.Mat) await new Promise<void>((resolve) => (cv.onRuntimeInitialized = () => resolve()));
}
/** MergeMertens' picture as bytes. It takes four arguments here; an error would print the whole package. */
export function openCvFused(pictures: RawPicture[], weights: [number, number, number]): Uint8ClampedArray {
  const list = new cv.MatVector();
  for (const { data, width, height } of pictures) {
    const mat = new cv.Mat(height, width, cv.CV_8UC3);
    mat.data.set(data);
    list.push_back(mat);
  }
  const result = new cv.Mat();
  new cv.MergeMertens(...weights).process(list, result, new cv.Mat(), new cv.Mat());
  const bytes = Uint8ClampedArray.from(result.data32F as Float32Array, (value) => value * 255);
  result.delete();
  return bytes;
}
/* eslint-enable @typescript-eslint/no-explicit-any */

/** What Debian's enfuse makes of frames, as RGB bytes. */
export async function enfuse(pictures: RawPicture[], options: string[]): Promise<Buffer> {
  const folder = mkdtempSync(path.join(tmpdir(), 'oriel-fusion-'));
  try {
    return await enfuseIn(folder, pictures, options);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

async function enfuseIn(folder: string, pictures: RawPicture[], options: string[]): Promise<Buffer> {
  const files = await Promise.all(
    pictures.map(async (picture, index) => {
      const file = path.join(folder, `${index}.tif`);
      await fromRaw(picture).tiff({ compression: 'none' }).toFile(file);
      return file;
    }),
  );
  const output = path.join(folder, 'fused.tif');
  execFileSync('enfuse', ['--blend-colorspace=identity', ...options, '-o', output, ...files], { stdio: 'ignore' });
  return (await toRaw(sharp(output).removeAlpha())).data;
}

/** Structural similarity of two pictures of RGB bytes (npm ssim.js), 1 where they are the same. */
export function likeness(one: ArrayLike<number>, other: ArrayLike<number>, { width, height }: { width: number; height: number }): number {
  const rgba = (bytes: ArrayLike<number>) => {
    const data = new Uint8ClampedArray(width * height * 4).fill(255);
    for (let at = 0; at < width * height; at++)
      for (let colour = 0; colour < 3; colour++) data[at * 4 + colour] = bytes[at * 3 + colour] ?? 0;
    return { data, width, height } as ImageData;
  };
  return ssim(rgba(one), rgba(other)).mssim;
}

/** The plain average of frames. */
export function averageOf(frames: RawPicture[]): Buffer {
  return Buffer.from((frames[0]?.data ?? []).map((_, at) => frames.reduce((sum, { data }) => sum + (data[at] ?? 0), 0) / frames.length));
}
