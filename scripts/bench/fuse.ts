import { spawn } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { createPixels } from '../../api/imaging/pixels/pixels.ts';
import { type Figure, figure, inTurns, median, seconds } from './figures.ts';
import { drawPhotographs } from './photographs.ts';

const STOPS = [-4, -2, 0, 2, 4];

/** Five exposures of one drawn photograph, 2560 pixels long, as their derivatives are kept. */
async function drawExposures(dir: string): Promise<{ file: string; jpeg: Buffer; ev: number }[]> {
  const [photograph = ''] = await drawPhotographs(1, 6000, 4000);
  const scene = await sharp(photograph).resize(2560).removeAlpha().png({ compressionLevel: 1 }).toBuffer();
  return Promise.all(
    STOPS.map(async (ev, index) => {
      const file = path.join(dir, `${index}.jpg`);
      // Brighter by stops in light is brighter by this factor in tones near enough.
      const jpeg = await sharp(scene)
        .linear(2 ** (ev / 2.2))
        .jpeg({ quality: 82, chromaSubsampling: '4:4:4' })
        .toBuffer();
      fs.writeFileSync(file, jpeg);
      return { file, jpeg, ev };
    }),
  );
}

/** Largest resident memory that the system counted for a process, in MB. */
const peak = (pid: number) => Number(/VmHWM:\s+(\d+)/.exec(fs.readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1] ?? 0) / 1024;

/** The child of ours that works on pixels. */
function pixelsChild(): number {
  const children = fs.readFileSync(`/proc/self/task/${process.pid}/children`, 'utf8').trim().split(' ').map(Number);
  return children.find((pid) => fs.readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes('pixels/child.ts')) ?? 0;
}

function enfuse(files: string[], output: string): Promise<number> {
  return new Promise((resolve, reject) => {
    const child = spawn('enfuse', ['--compression=82', '-o', output, ...files], { stdio: 'ignore' });
    let most = 0;
    const timer = setInterval(() => (most = Math.max(most, alive(child.pid))), 10);
    child.once('error', reject);
    child.once('close', (code) => {
      clearInterval(timer);
      if (code === 0) resolve(most);
      else reject(new Error(`enfuse ended with ${code}`));
    });
  });
}

function alive(pid: number | undefined): number {
  try {
    return peak(pid ?? 0);
  } catch {
    return 0;
  }
}

/** Five exposures as JPEGs become a merged picture: ours as a job does it, in a child and with all three sizes written; enfuse with one. */
export async function fuse(rounds: number): Promise<Figure[]> {
  const dir = fs.mkdtempSync(path.join(os.tmpdir(), 'oriel-bench-fuse-'));
  const pixels = createPixels({ processes: 1, timeoutSeconds: 300, maxPixels: 300e6 });
  try {
    const exposures = await drawExposures(dir);
    const files = exposures.map(({ file }) => file);
    const merge = () => pixels.merge(exposures, 2);
    const first = await seconds(merge);
    const memory: number[] = [];
    const { ours, reference } = await inTurns(
      rounds,
      () => seconds(merge),
      () => seconds(async () => memory.push(await enfuse(files, path.join(dir, 'fused.jpg')))),
    );
    return [
      figure('5 exposures of 2560 px, merged', 's', median(ours), median(reference)),
      figure('the first of a new process', 's', first, median(reference)),
      figure('most memory', 'MB', peak(pixelsChild()), Math.max(...memory)),
    ];
  } finally {
    await pixels.stop();
    fs.rmSync(dir, { recursive: true, force: true });
  }
}
