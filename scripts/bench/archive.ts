import { spawn } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { Account } from '../../api/models/Account.ts';
import { Frame } from '../../api/models/Frame.ts';
import { Pick } from '../../api/models/Pick.ts';
import { PickList } from '../../api/models/PickList.ts';
import { Proof } from '../../api/models/Proof.ts';
import { Sheet } from '../../api/models/Sheet.ts';
import { originalKey, RECIPE } from '../../api/services/storage-keys.ts';
import { freePort } from '../../docker-free-dev/ports.ts';
import { type BenchHouse, startBenchHouse, watchMemory } from './bench-house.ts';
import { type Figure, figure, inTurns, median, seconds } from './figures.ts';

const FILES = 200;
const BYTES = 12_000_000;

function run(command: string, args: string[], cwd?: string): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd, stdio: ['ignore', 'ignore', 'pipe'] });
    let said = '';
    child.stderr.on('data', (chunk: Buffer) => (said += chunk.toString()));
    child.once('error', reject);
    child.once('close', (code) => (code === 0 ? resolve() : reject(new Error(`${command} ${args.join(' ')}: ${code} ${said}`))));
  });
}

/** A pick list of so many originals: files on disk for the reference, the same bytes in the store for ours. */
async function makePicks(house: BenchHouse, dir: string): Promise<string> {
  const { id: commissionId, studioId } = house.commission;
  const lead = await Account.query().insertAndFetch({ email: 'lead@tarn-brandreth.test', name: 'Oskar Lind' });
  const terms = { allowance: FILES, extraPrice: 0, currency: 'GBP' };
  const watermark = { kind: 'none' as const, text: '', opacity: 0.3, size: 0.5, tiled: false };
  const sheet = await Sheet.query().insertAndFetch({
    studioId,
    commissionId,
    number: 1,
    ...terms,
    watermark,
    issuedAt: new Date(),
    sentAt: new Date(),
  });
  const list = await PickList.query().insertAndFetch({
    studioId,
    sheetId: sheet.id,
    commissionId,
    number: 1,
    sentBy: lead.id,
    sentByName: lead.name,
    pickCount: FILES,
    extraCount: 0,
    ...terms,
  });
  for (let at = 1; at <= FILES; at += 1) {
    const bytes = randomBytes(BYTES);
    const name = `HL_${String(at).padStart(4, '0')}.jpg`;
    fs.writeFileSync(path.join(dir, name), bytes);
    const storageKey = originalKey(studioId, commissionId);
    await house.ctx.store.put(storageKey, bytes, 'image/jpeg');
    const frame = await Frame.query().insertAndFetch({
      studioId,
      commissionId,
      state: 'ready',
      originalName: name,
      name,
      mediaType: 'image/jpeg',
      sizeBytes: BYTES,
      sha256: createHash('sha256').update(bytes).digest('hex'),
      storageKey,
      width: 6000,
      height: 4000,
      recipe: RECIPE,
    });
    const proof = await Proof.query().insertAndFetch({ studioId, sheetId: sheet.id, frameId: frame.id, number: at, position: at });
    await Pick.query().insert({
      studioId,
      pickListId: list.id,
      number: at,
      proofId: proof.id,
      proofNumber: at,
      frameId: frame.id,
      frameName: name,
      extra: false,
      markedBy: [],
    });
  }
  return list.id;
}

/** Has the archive built by the worker and fetches it. */
async function ours(house: BenchHouse, pickListId: string): Promise<void> {
  const headers = { cookie: house.cookie };
  const address = `${house.address}/api/pick-lists/${pickListId}/archive`;
  await fetch(address, { method: 'POST', headers });
  for (;;) {
    const { state, problem } = (await (await fetch(address, { headers })).json()) as { state: string; problem: string | null };
    if (state === 'ready') break;
    if (state === 'failed') throw new Error(problem ?? 'The archive failed.');
    await pause(200);
  }
  await run('curl', ['-sS', '-f', '-o', '/dev/null', '-H', `Cookie: ${house.cookie}`, `${address}/download`]);
}

async function forget(house: BenchHouse): Promise<void> {
  const rows = await house.ctx.knex('archives').delete().returning<{ storageKey: string }[]>('storageKey');
  await house.ctx.store.remove(...rows.map((row) => row.storageKey));
}

async function startNginx(dir: string): Promise<{ port: number; stop(): void }> {
  const port = await freePort();
  const configuration = `daemon off; user root; pid ${dir}/nginx.pid; error_log ${dir}/error.log; events {}
    http { access_log off; sendfile on; server { listen 127.0.0.1:${port}; root ${dir}; } }`;
  fs.writeFileSync(path.join(dir, 'nginx.conf'), configuration);
  const child = spawn('nginx', ['-c', path.join(dir, 'nginx.conf')], { stdio: 'ignore' });
  await pause(500);
  return { port, stop: () => void child.kill('SIGTERM') };
}

/** 200 files of 12 MB as an archive, built and fetched, against `zip -0` of the same files and curl of the result from nginx. */
export async function archive(rounds: number): Promise<Figure[]> {
  const house = await startBenchHouse();
  const dir = fs.mkdtempSync(path.join(house.dir, 'archive-'));
  const files = path.join(dir, 'files');
  fs.mkdirSync(files);
  const nginx = await startNginx(dir);
  const grown: number[] = [];
  try {
    const pickListId = await makePicks(house, files);
    const result = await inTurns(
      rounds,
      async () => {
        const worker = await watchMemory(house.workerPid, () => watchMemory(house.apiPid, () => seconds(() => ours(house, pickListId))));
        grown.push(worker.most - worker.before, worker.result.most - worker.result.before);
        await forget(house);
        return worker.result.result;
      },
      async () => {
        const zip = path.join(dir, 'all.zip');
        const took = await seconds(async () => {
          await run('zip', ['-0', '-q', '-r', zip, '.'], files);
          await run('curl', ['-sS', '-f', '-o', '/dev/null', `http://127.0.0.1:${nginx.port}/all.zip`]);
        });
        fs.rmSync(zip);
        return took;
      },
    );
    return [
      figure(`${FILES} files of ${BYTES / 1e6} MB, built and fetched`, 's', median(result.ours), median(result.reference)),
      figure('memory growth, API or worker, most', 'MB', Math.max(...grown)),
    ];
  } finally {
    nginx.stop();
    await house.stop();
  }
}
