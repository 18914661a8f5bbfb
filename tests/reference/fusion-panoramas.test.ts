import parseExr from 'parse-exr';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { type Exposure, mergeExposures } from '../../api/imaging/merge/merge-exposures.ts';
import { expose, type Scene } from '../support/exposures.ts';
import { averageOf, enfuse, likeness, openCvFused, openOpenCv } from '../support/fusion-oracles.ts';

/**
 * Light measured at real places: the panoramas of high dynamic range in npm @pmndrs/assets 1.7.0 (CC0-1.0), 512 × 256 in linear light, read by npm
 * parse-exr. Exposed at five steps they are true brackets; the merged proof is compared with OpenCV's MergeMertens and Debian's enfuse.
 */
vi.setConfig({ testTimeout: 120_000 });
beforeAll(openOpenCv);

/** Tone of the middle of a scene at 0 stops: common practice, 18% grey. */
const MIDDLE = 0.18;

/** enfuse adds its weights up, so it is another picture by definition; OpenCV follows the paper as we do. */
const LEAST = { enfuse: 0.93, openCv: 0.98 };

async function panorama(name: string): Promise<Scene> {
  const { default: address } = (await import(`@pmndrs/assets/hdri/${name}.exr.js`)) as { default: string };
  const bytes = Uint8Array.from(Buffer.from(address.slice(address.indexOf(',') + 1), 'base64'));
  const { data, width, height } = parseExr(bytes.buffer, 1015);
  const light = new Float32Array(width * height * 3);
  for (let at = 0; at < light.length; at += 1) light[at] = data[Math.floor(at / 3) * 4 + (at % 3)] ?? 0;
  const greens = light.filter((_, at) => at % 3 === 1).sort();
  const gain = MIDDLE / (greens[greens.length >> 1] ?? 1);
  return { light: light.map((value) => value * gain), width, height };
}

describe('a merged proof of a real place', () => {
  it.each(['bridge', 'city', 'night', 'sunset', 'dawn'])(
    '%s: nearer to both outside programs than the average and than the best single frame',
    async (name) => {
      const scene = await panorama(name);
      const frames = [-4, -2, 0, 2, 4].map((ev, index) => expose(scene, ev, index + 1));
      const exposures: Exposure[] = frames.map((picture, index) => ({ picture, ev: 2 * index - 4 }));
      const { picture, leftOut, shifts } = mergeExposures(exposures, 2);
      expect({ leftOut, shifts }).toEqual({ leftOut: [], shifts: frames.map(() => ({ x: 0, y: 0 })) });
      const theirs = { enfuse: await enfuse(frames, []), openCv: openCvFused(frames, [1, 1, 1]) };
      for (const program of ['enfuse', 'openCv'] as const) {
        const found = likeness(picture.data, theirs[program], scene);
        const others = [averageOf(frames), ...frames.map(({ data }) => data)].map((other) => likeness(other, theirs[program], scene));
        expect(found).toBeGreaterThanOrEqual(LEAST[program]);
        expect(found).toBeGreaterThan(Math.max(...others));
      }
    },
  );
});
