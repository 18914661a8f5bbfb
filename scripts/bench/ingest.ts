import { fork, spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { type BenchHouse, startBenchHouse, watchMemory } from './bench-house.ts';
import { type Figure, figure, inTurns, median, percentile, seconds } from './figures.ts';
import { drawPhotographs } from './photographs.ts';

const FILES = 60;
const PART = 8 * 1024 * 1024;
const SIZES = [2560, 960, 480];

interface Source {
  file: string;
  bytes: Buffer;
  sha256: string;
}

async function send(house: BenchHouse, source: Source): Promise<void> {
  const headers = { cookie: house.cookie };
  const json = { ...headers, 'content-type': 'application/json' };
  const begun = await fetch(`${house.address}/api/commissions/${house.commission.id}/uploads`, {
    method: 'POST',
    headers: json,
    body: JSON.stringify({ purpose: 'frame', name: path.basename(source.file), size: source.bytes.length, sha256: source.sha256 }),
  });
  if (begun.status !== 201) throw new Error(`The upload was not opened: ${begun.status} ${await begun.text()}`);
  const { id: uploadId } = (await begun.json()) as { id: string };
  for (let at = 0; at * PART < source.bytes.length; at += 1) {
    const form = new FormData();
    form.set('part', new Blob([new Uint8Array(source.bytes.subarray(at * PART, (at + 1) * PART))]), 'part');
    const answer = await fetch(`${house.address}/api/uploads/${uploadId}/parts/${at + 1}`, { method: 'PUT', headers, body: form });
    if (!answer.ok) throw new Error(`Part ${at + 1} was refused: ${answer.status} ${await answer.text()}`);
  }
  const done = await fetch(`${house.address}/api/uploads/${uploadId}/complete`, { method: 'POST', headers: json, body: '{}' });
  if (!done.ok) throw new Error(`The upload was not completed: ${done.status}`);
}

/** Four files abreast, as the browser sends them; ends when the last derivative is stored. */
async function takeIn(house: BenchHouse, sources: Source[]): Promise<void> {
  const waiting = [...sources];
  const lane = async () => {
    for (let source = waiting.shift(); source; source = waiting.shift()) await send(house, source);
  };
  await Promise.all([lane(), lane(), lane(), lane()]);
  for (;;) {
    const ready = await house.ctx
      .knex('frames')
      .where({ commissionId: house.commission.id, state: 'ready' })
      .count<{ count: number }[]>('* as count');
    if (Number(ready[0]?.count) === sources.length) return;
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
async function vipsthumbnail(sources: Source[], dir: string): Promise<void> {
  const cores = os.availableParallelism();
  const shares = Array.from({ length: cores }, (_, core) =>
    sources.filter((_each, at) => at % cores === core).map((source) => source.file),
  );
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
  const sources = files.map((file) => {
    const bytes = fs.readFileSync(file);
    return { file, bytes, sha256: createHash('sha256').update(bytes).digest('hex') };
  });
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
            const work = takeIn(house, sources);
            latencies.push(...(await askMeanwhile(house, work)));
            await work;
          }),
        );
        memory.push(watched.most);
        await forget(house);
        return watched.result;
      },
      () => seconds(() => vipsthumbnail(sources, out)),
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
