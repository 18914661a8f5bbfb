import { fork, spawn } from 'node:child_process';
import { once } from 'node:events';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { type BenchHouse, startBenchHouse, watchMemory } from './bench-house.ts';
import { type Figure, figure, inTurns, median, percentile, seconds } from './figures.ts';
import { drawPhotographs } from './photographs.ts';
import type { Sending } from './send-files.ts';

const FILES = 60;
const SIZES = [2560, 960, 480];

/** Uploads the files from a process of its own. */
async function send(sending: Sending): Promise<void> {
  const child = fork('scripts/bench/send-files.ts', {
    execArgv: ['--import', 'tsx'],
    env: { ...process.env, BENCH_SENDING: JSON.stringify(sending) },
  });
  const [code] = (await once(child, 'exit')) as [number | null];
  if (code !== 0) throw new Error(`The process that uploads ended with ${code}.`);
}

/** Ends when the last derivative is stored. */
async function takeIn(house: BenchHouse, files: string[]): Promise<void> {
  await send({ address: house.address, commissionId: house.commission.id, cookie: house.cookie, files });
  for (;;) {
    const ready = await house.ctx
      .knex('frames')
      .where({ commissionId: house.commission.id, state: 'ready' })
      .count<{ count: number }[]>('* as count');
    if (Number(ready[0]?.count) === files.length) return;
    const failed = await house.ctx.knex('uploads').where({ state: 'failed' }).first('problem');
    if (failed) throw new Error(failed.problem);
    await pause(50);
  }
}

async function forget(house: BenchHouse): Promise<void> {
  await house.ctx.knex('frames').delete();
  await house.ctx.knex('uploads').delete();
  const keys: string[] = [];
  for await (const { key } of house.ctx.store.list(`studios/${house.studio.id}`)) keys.push(key);
  await house.ctx.store.remove(...keys);
}

/** libvips' own command on the same files: half of them to each of two processes, one thread each, every size from the original. */
async function vipsthumbnail(sources: string[], dir: string): Promise<void> {
  const cores = os.availableParallelism();
  const shares = Array.from({ length: cores }, (_, core) => sources.filter((_each, at) => at % cores === core));
  await Promise.all(
    shares.map(async (files) => {
      for (const size of SIZES) {
        const output = `${dir}/%s-${size}.jpg[Q=82,strip${size === 2560 ? ',subsample-mode=off' : ''}]`;
        await run('vipsthumbnail', [
          '--vips-concurrency=1',
          '--size',
          `${size}x${size}>`,
          '--export-profile',
          'srgb',
          '-o',
          output,
          ...files,
        ]);
      }
    }),
  );
}

function run(command: string, args: string[]): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { stdio: ['ignore', 'ignore', 'pipe'] });
    let said = '';
    child.stderr.on('data', (chunk: Buffer) => (said += chunk.toString()));
    child.once('error', reject);
    child.once('close', (code) => (code === 0 ? resolve() : reject(new Error(`${command}: ${said}`))));
  });
}

/** How long the other routes take meanwhile, in ms, asked by a process of its own. */
async function askMeanwhile(house: BenchHouse, until: Promise<unknown>): Promise<number[]> {
  const routes = ['/api/me', `/api/commissions/${house.commission.id}`].map((route) => house.address + route);
  const child = fork('scripts/bench/ask-meanwhile.ts', {
    execArgv: ['--import', 'tsx'],
    env: { ...process.env, BENCH_ROUTES: JSON.stringify(routes), BENCH_COOKIE: house.cookie },
  });
  const answer = new Promise<number[]>((resolve, reject) => {
    child.once('message', (took) => resolve(took as number[]));
    child.once('error', reject);
    child.once('exit', (code) => reject(new Error(`The process that asks ended with ${code}.`)));
  });
  await until;
  child.send('stop');
  return answer;
}

/** 60 JPEGs of 24 megapixels, uploaded over HTTP until the last derivative is stored. */
export async function ingest(rounds: number): Promise<Figure[]> {
  const files = await drawPhotographs(FILES, 6000, 4000);
  const house = await startBenchHouse();
  const out = fs.mkdtempSync(path.join(os.tmpdir(), 'oriel-bench-vips-'));
  const memory: number[] = [];
  const latencies: number[] = [];
  try {
    const { ours, reference } = await inTurns(
      rounds,
      async () => {
        const watched = await watchMemory(house.apiPid, () =>
          seconds(async () => {
            const work = takeIn(house, files);
            latencies.push(...(await askMeanwhile(house, work)));
            await work;
          }),
        );
        memory.push(watched.most);
        await forget(house);
        return watched.result;
      },
      () => seconds(() => vipsthumbnail(files, out)),
    );
    return [
      figure(`${FILES} JPEGs of 24 megapixels`, 's', median(ours), median(reference)),
      figure('API process, most memory', 'MB', Math.max(...memory)),
      figure('other routes meanwhile, p95', 'ms', percentile(latencies, 0.95)),
    ];
  } finally {
    fs.rmSync(out, { recursive: true, force: true });
    await house.stop();
  }
}
