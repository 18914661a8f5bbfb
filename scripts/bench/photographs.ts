import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import sharp from 'sharp';

/**
 * Draws JPEGs that cost what photographs of buildings cost: edges of many sizes, sky, and sensor noise. They are drawn once and kept in the
 * temporary folder. Returns the files.
 */
export async function drawPhotographs(count: number, width: number, height: number): Promise<string[]> {
  const dir = path.join(os.tmpdir(), `oriel-bench-photographs-${width}x${height}`);
  fs.mkdirSync(dir, { recursive: true });
  const files = [];
  for (let at = 0; at < count; at += 1) {
    const file = path.join(dir, `HL_${String(at).padStart(4, '0')}.jpg`);
    files.push(file);
    if (fs.existsSync(file)) continue;
    const noise = await sharp({
      create: { width, height, channels: 3, background: '#000', noise: { type: 'gaussian', mean: 128, sigma: 5 } },
    })
      .raw()
      .toBuffer();
    const drawn = sharp(Buffer.from(facade(width, height, at)))
      .composite([{ input: noise, raw: { width, height, channels: 3 }, blend: 'soft-light' }])
      .flatten();
    await drawn.jpeg({ quality: 90 }).withMetadata().toFile(`${file}.part`);
    fs.renameSync(`${file}.part`, file);
  }
  return files;
}

/** Houses with windows under a sky, different for each number. */
function facade(width: number, height: number, seed: number): string {
  let state = seed * 7919 + 13;
  const random = () => (state = (state * 16807) % 2147483647) / 2147483647;
  const shapes: string[] = [];
  for (let x = 0; x < width; x += 180 + random() * 260) {
    const [w, h, tone] = [150 + random() * 240, height * (0.25 + random() * 0.6), Math.floor(60 + random() * 120)];
    shapes.push(`<rect x="${x}" y="${height - h}" width="${w}" height="${h}" fill="rgb(${tone},${tone - 8},${tone - 18})"/>`);
    for (let y = height - h + 30; y < height - 40; y += 62) {
      for (let u = x + 14; u < x + w - 30; u += 44)
        shapes.push(`<rect x="${u}" y="${y}" width="24" height="38" fill="rgb(${random() < 0.3 ? '250,210,130' : '40,50,70'})"/>`);
    }
  }
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}"><defs><linearGradient id="s" x1="0" y1="0" x2="0" y2="1"><stop offset="0" stop-color="#27395f"/><stop offset="1" stop-color="#d9a579"/></linearGradient></defs><rect width="100%" height="100%" fill="url(#s)"/>${shapes.join('')}</svg>`;
}
