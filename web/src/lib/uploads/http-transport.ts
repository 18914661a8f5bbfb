import type { NewUpload, Upload, UploadList, UploadPurpose, UploadStart } from '../../../../api/contract/uploads.ts';
import { send } from './send.ts';
import { TransportProblem, type CheckState, type Offer, type OfferAnswer, type UploadTransport } from './transport.ts';

export type { UploadPurpose };

/** Uploads asked for in one list: far more than are being checked at any time. */
const NEWEST = 200;
/** So few are asked for one by one, which costs the server less than a list. */
const FEW = 2;

/** The requests of the queue over HTTP, for one commission. */
export function httpTransport(commissionId: string, purpose: UploadPurpose): UploadTransport {
  const path = `/api/commissions/${commissionId}/uploads`;
  return {
    async offer(offer, signal) {
      const body = JSON.stringify(newUpload(purpose, offer));
      return offerAnswer(await commissionThere(send({ method: 'POST', path, body, signal })));
    },
    async putPart(uploadId, number, bytes, onProgress, signal) {
      const body = new FormData();
      body.append('part', bytes, `part-${number}`);
      await send({ method: 'PUT', path: `/api/uploads/${uploadId}/parts/${number}`, body, onProgress, signal });
    },
    async complete(uploadId, signal) {
      await send({ method: 'POST', path: `/api/uploads/${uploadId}/complete`, signal });
    },
    check: (uploadIds, signal) => check(path, purpose, uploadIds, signal),
    async abandon(uploadId) {
      const { signal } = new AbortController();
      await send({ method: 'DELETE', path: `/api/uploads/${uploadId}`, signal }).catch(() => undefined);
    },
  };
}

function newUpload(purpose: UploadPurpose, { name, size, sha256, lastModified }: Offer): NewUpload {
  return { purpose, name, size, sha256, lastModified: new Date(lastModified).toISOString() };
}

function offerAnswer(answer: unknown): OfferAnswer {
  const start = answer as UploadStart;
  if (start.state === 'known') return { kind: 'known', sentence: `Already in this commission as ${start.name}.` };
  if (start.state !== 'receiving') return { kind: 'checking', uploadId: start.id };
  return { kind: 'upload', uploadId: start.id, partSize: start.partSize, partsThere: start.partsThere };
}

/** A missing commission is no lost upload: asking again would not bring it back. */
async function commissionThere(request: Promise<unknown>): Promise<unknown> {
  try {
    return await request;
  } catch (error) {
    if (!(error instanceof TransportProblem) || error.kind !== 'gone') throw error;
    throw new TransportProblem('refused', 'This commission is not there any more.');
  }
}

async function check(path: string, purpose: UploadPurpose, ids: string[], signal: AbortSignal): Promise<CheckState[]> {
  const states: CheckState[] = [];
  if (ids.length > FEW) {
    const query = `?purpose=${purpose}&limit=${NEWEST}`;
    const { items } = (await send({ method: 'GET', path: path + query, signal })) as UploadList;
    states.push(...items.filter((item) => ids.includes(item.id)).map(checkState));
  }
  const missing = ids.filter((id) => !states.some((state) => state.uploadId === id));
  for (const id of missing.slice(0, FEW)) states.push(await checkOne(id, signal));
  return states;
}

async function checkOne(uploadId: string, signal: AbortSignal): Promise<CheckState> {
  try {
    return checkState((await send({ method: 'GET', path: `/api/uploads/${uploadId}`, signal })) as Upload);
  } catch (error) {
    if (!(error instanceof TransportProblem) || error.kind !== 'gone') throw error;
    return { uploadId, state: 'failed', problem: 'The upload was given up.' };
  }
}

function checkState({ id, state, problem }: Pick<Upload, 'id' | 'state' | 'problem'>): CheckState {
  if (state === 'done') return { uploadId: id, state: 'done' };
  if (state === 'failed') return { uploadId: id, state: 'failed', problem: problem ?? 'The server refused this file.' };
  if (state === 'cancelled') return { uploadId: id, state: 'failed', problem: 'The upload was given up.' };
  return { uploadId: id, state: 'checking' };
}
