import sharp, { type Sharp } from 'sharp';

/** Pixels of a made-up street at dusk: sky, towers with lit windows, noise. The same for the same numbers. */
export function photographPixels(width: number, height: number, seed = 1): Buffer {
  let state = (seed * 2654435761) >>> 0 || 1;
  const random = () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 2 ** 32;
  const towers = Array.from({ length: 9 }, (_, index) => ({
    from: (index / 9 + random() * 0.03) * width,
    to: ((index + 0.75) / 9) * width,
    top: height * (0.25 + random() * 0.45),
    tone: 30 + random() * 90,
  }));
  const towerOf = Array.from({ length: width }, (_, x) => towers.find(({ from, to }) => x >= from && x < to));
  const pixels = Buffer.alloc(width * height * 3);
  for (let y = 0, at = 0; y < height; y++) {
    const glow = y / height;
    for (let x = 0; x < width; x++) {
      const tower = towerOf[x];
      const built = tower !== undefined && y >= tower.top;
      const lit = built && Math.floor(x / 9) % 3 === 0 && Math.floor(y / 11) % 2 === 0;
      const noise = (random() - 0.5) * 14;
      // A byte keeps what is written to it within 0 and 255 here: no tone comes near either end.
      pixels[at++] = (lit ? 235 : built ? tower.tone : 90 + 130 * glow) + noise;
      pixels[at++] = (lit ? 190 : built ? tower.tone : 100 + 60 * glow) + noise;
      pixels[at++] = (lit ? 110 : built ? tower.tone + 12 : 160) + noise;
    }
  }
  return pixels;
}

/** The same as a picture that can be written in any format. */
export function photograph(width = 1200, height = 800, seed = 1): Sharp {
  return sharp(photographPixels(width, height, seed), { raw: { width, height, channels: 3 } });
}

/** Mean difference of two pictures in grey levels, both scaled to the size of the first. */
export async function meanDifference(first: Buffer | string, second: Buffer | string): Promise<number> {
  const one = await sharp(first).removeAlpha().toColourspace('srgb').raw().toBuffer({ resolveWithObject: true });
  const { width, height } = one.info;
  const two = await sharp(second).removeAlpha().resize(width, height, { fit: 'fill' }).toColourspace('srgb').raw().toBuffer();
  let total = 0;
  for (let index = 0; index < two.length; index++) total += Math.abs((one.data[index] ?? 0) - (two[index] ?? 0));
  return total / two.length;
}
