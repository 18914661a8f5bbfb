import { createHash } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';

/*
 * Uploads files as a browser does: four abreast, in parts of 8 MiB. A browser has a machine of its own; on this one it stands behind the
 * server, so that the answers of the server are measured and not the wait for a core. What to send comes in the environment.
 */
os.setPriority(10);

export interface Sending {
  address: string;
  commissionId: string;
  cookie: string;
  files: string[];
}

const PART = 8 * 1024 * 1024;
const ABREAST = 4;

const { address, commissionId, cookie, files } = JSON.parse(process.env.BENCH_SENDING ?? '{}') as Sending;
const json = { cookie, 'content-type': 'application/json' };

async function ask(method: string, route: string, init: { headers: Record<string, string>; body: string | FormData }): Promise<Response> {
  const answer = await fetch(address + route, { method, ...init });
  if (!answer.ok) throw new Error(`${method} ${route}: ${answer.status} ${await answer.text()}`);
  return answer;
}

async function send(file: string): Promise<void> {
  const bytes = fs.readFileSync(file);
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  const about = { purpose: 'frame', name: path.basename(file), size: bytes.length, sha256 };
  const begun = await ask('POST', `/api/commissions/${commissionId}/uploads`, { headers: json, body: JSON.stringify(about) });
  const { id } = (await begun.json()) as { id: string };
  for (let at = 0; at * PART < bytes.length; at += 1) {
    const body = new FormData();
    body.set('part', new Blob([new Uint8Array(bytes.subarray(at * PART, (at + 1) * PART))]), 'part');
    await ask('PUT', `/api/uploads/${id}/parts/${at + 1}`, { headers: { cookie }, body });
  }
  await ask('POST', `/api/uploads/${id}/complete`, { headers: json, body: '{}' });
}

const waiting = [...files];
const lane = async () => {
  for (let file = waiting.shift(); file; file = waiting.shift()) await send(file);
};
await Promise.all(Array.from({ length: ABREAST }, lane));
