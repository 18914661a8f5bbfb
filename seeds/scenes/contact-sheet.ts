import fs from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import sharp from 'sharp';
import { type DrawnFrame, drawDemoFrames } from './draw.ts';

const CELL = 320;
const GAP = 10;
const LABEL = 18;
const COLUMNS = 5;

/** Lays small copies of the frames out in rows, each with its name, and writes one PNG. */
export async function contactSheet(frames: readonly DrawnFrame[], out: string): Promise<void> {
  const height = Math.round((CELL * 3) / 4) + LABEL;
  const rows = Math.ceil(frames.length / COLUMNS);
  const cells = await Promise.all(
    frames.map(async (frame, i) => {
      const left = GAP + (i % COLUMNS) * (CELL + GAP);
      const top = GAP + Math.floor(i / COLUMNS) * (height + GAP);
      const picture = await sharp(frame.file)
        .rotate()
        .resize(CELL, height - LABEL, { fit: 'inside' })
        .toColourspace('srgb')
        .png()
        .toBuffer();
      const words = `${frame.name}  ${frame.scene}${frame.step === 0 ? '' : ` ${frame.step > 0 ? '+' : ''}${frame.step}`}`;
      const label = Buffer.from(
        `<svg width="${CELL}" height="${LABEL}"><text x="0" y="13" font-family="sans-serif" font-size="12">${words}</text></svg>`,
      );
      return [
        { input: picture, left, top },
        { input: label, left, top: top + height - LABEL },
      ];
    }),
  );
  await sharp({ create: { width: GAP + COLUMNS * (CELL + GAP), height: GAP + rows * (height + GAP), channels: 3, background: '#f2f2f2' } })
    .composite(cells.flat())
    .png()
    .toFile(out);
}

async function main(out: string): Promise<void> {
  const dir = process.env.ORIEL_SCENES_DIR ?? (await fs.mkdtemp(path.join(os.tmpdir(), 'oriel-scenes-')));
  const longSide = Number(process.env.ORIEL_SCENES_SIDE ?? 960);
  const frames = await drawDemoFrames({ dir, longSide, onProgress: (n, all) => process.stderr.write(`\r${n} of ${all} `) });
  await contactSheet(frames, out);
  process.stderr.write(`\n${out}\n`);
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const out = process.argv[2];
  if (!out) throw new Error('Name the PNG to be written: tsx seeds/scenes/contact-sheet.ts sheet.png');
  await main(out);
}
