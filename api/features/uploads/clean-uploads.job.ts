import { readdir, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Job } from '../../jobs/job.ts';
import { Upload } from '../../models/Upload.ts';
import { endUpload } from './cancel-upload.ts';
import { FOLDER } from './fetch-upload.ts';

const HOUR = 60 * 60 * 1000;
const DAY = 24 * HOUR;
/** An upload that nobody went on with for so long is given up. */
const UNTOUCHED = 7 * DAY;
/** A check takes minutes at most; what stands for a day was lost with its worker. */
const STUCK = DAY;
/** What ended is forgotten after so long. */
const FORGOTTEN = 90 * DAY;

const ago = (span: number) => new Date(Date.now() - span);

async function end(state: 'receiving' | 'checking', span: number, as: Parameters<typeof endUpload>[3]): Promise<void> {
  const stale = await Upload.query().where({ state }).where('updatedAt', '<', ago(span)).limit(500);
  for (const upload of stale) await Upload.transaction((trx) => endUpload(trx, upload, state, as));
}

/** Temporary folders of workers that were killed; a living one is far younger. */
async function sweepFolders(): Promise<void> {
  const names = (await readdir(tmpdir())).filter((name) => name.startsWith(FOLDER));
  for (const folder of names.map((name) => path.join(tmpdir(), name))) {
    const made = await stat(folder).catch(() => undefined);
    if (made && made.mtimeMs < Date.now() - 2 * HOUR) await rm(folder, { recursive: true, force: true });
  }
}

/** Clears away what interrupted uploads leave: parts in the store, rows, temporary files. */
export const cleanUploads: Job = {
  name: 'clean-uploads',
  every: '17 * * * *',
  async run() {
    await end('receiving', UNTOUCHED, { state: 'cancelled', problem: null });
    await end('checking', STUCK, { state: 'failed', problem: 'The file could not be taken in. Upload it again.' });
    await Upload.query()
      .delete()
      .whereIn('state', ['done', 'failed', 'cancelled'])
      .whereNull('multipartId')
      .where('updatedAt', '<', ago(FORGOTTEN));
    await sweepFolders();
  },
};
