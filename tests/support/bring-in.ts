import { createHash } from 'node:crypto';
import type { Response } from 'supertest';
import type { Upload } from '../../api/contract/uploads.ts';
import type { SignedIn } from './session.ts';

export const sha256 = (bytes: Buffer): string => createHash('sha256').update(bytes).digest('hex');

export interface BringIn {
  name?: string;
  purpose?: 'frame' | 'final';
  /** What is claimed instead of the truth. */
  sha256?: string;
  size?: number;
}

/** Begins an upload of a file, as the browser does. */
export function begin(person: SignedIn, commissionId: string, file: Buffer, values: BringIn = {}): Promise<Response> {
  const { name = 'HL_0412.jpg', purpose = 'frame', size = file.length } = values;
  return person.agent
    .post(`/api/commissions/${commissionId}/uploads`)
    .send({ purpose, name, size, sha256: values.sha256 ?? sha256(file) })
    .then((answer) => answer);
}

/** Sends one part of a file, counted from 1. */
export function sendPart(person: SignedIn, upload: Pick<Upload, 'id' | 'partSize'>, file: Buffer, number: number): Promise<Response> {
  const from = (number - 1) * upload.partSize;
  return person.agent
    .put(`/api/uploads/${upload.id}/parts/${number}`)
    .attach('part', file.subarray(from, from + upload.partSize), `part-${number}`)
    .then((answer) => answer);
}

/** Brings a whole file up to the point where the worker takes it in; gives the completed upload. */
export async function bringUp(person: SignedIn, commissionId: string, file: Buffer, values: BringIn = {}): Promise<Upload> {
  const begun = await begin(person, commissionId, file, values);
  if (begun.status !== 201) throw new Error(`The upload did not begin: ${begun.status} ${begun.text}`);
  const upload = begun.body as Upload;
  for (let number = 1; number <= upload.partCount; number++) {
    const sent = await sendPart(person, upload, file, number);
    if (sent.status !== 200) throw new Error(`Part ${number} was not taken: ${sent.status} ${sent.text}`);
  }
  const completed = await person.agent.post(`/api/uploads/${upload.id}/complete`);
  if (completed.status !== 200) throw new Error(`The upload was not completed: ${completed.status} ${completed.text}`);
  return completed.body as Upload;
}
