import { createHash } from 'node:crypto';
import fs from 'node:fs/promises';
import { groupFrames } from '../../api/features/brackets/group-frames.job.ts';
import { beginUpload } from '../../api/features/uploads/begin-upload.ts';
import { completeUpload } from '../../api/features/uploads/complete-upload.ts';
import { noteFrames } from '../../api/features/uploads/note-frames.job.ts';
import { missingParts, partLength, readParts } from '../../api/features/uploads/upload-parts.ts';
import { Frame } from '../../api/models/Frame.ts';
import { Upload } from '../../api/models/Upload.ts';
import type { StaffActor } from '../../api/middleware/actor.ts';
import type { DrawnFrame } from '../scenes/draw.ts';
import { type Stage, until } from './stage.ts';

/** Uploads files the way a browser does, in parts, and waits until the worker has taken all of them in. */
export async function bringFiles(
  stage: Stage,
  actor: StaffActor,
  commissionId: string,
  files: readonly DrawnFrame[],
  purpose: 'frame' | 'final',
): Promise<void> {
  const ids: string[] = [];
  for (const file of files) ids.push(await bringFile(stage, actor, commissionId, file, purpose));
  await until(stage, `${files.length} files to be taken in`, async () => {
    const failed = await Upload.query().whereIn('id', ids).whereIn('state', ['failed', 'cancelled']).first();
    if (failed) throw new Error(`${failed.name} was not taken in: ${failed.problem}`);
    const done = await Upload.query().whereIn('id', ids).where({ state: 'done' }).resultSize();
    return done === ids.length ? true : undefined;
  });
  if (purpose === 'final') return;
  // Note and grouping wait for more frames; here it is known that none comes.
  const tools = { signal: new AbortController().signal, attempt: 1, lastAttempt: false };
  await noteFrames.run(stage.ctx, { commissionId, accountId: actor.accountId }, tools);
  await until(stage, `${files.length} frames to be measured`, async () => {
    const waiting = await Frame.query().where({ commissionId }).whereNull('measuresRecipe').resultSize();
    return waiting === 0 ? true : undefined;
  });
  await groupFrames.run(stage.ctx, { commissionId }, tools);
}

async function bringFile(
  { ctx }: Stage,
  actor: StaffActor,
  commissionId: string,
  { file, name }: DrawnFrame,
  purpose: 'frame' | 'final',
): Promise<string> {
  const bytes = await fs.readFile(file);
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  const begun = await beginUpload(ctx, actor, commissionId, { purpose, name, size: bytes.length, sha256 });
  if ('known' in begun) throw new Error(`${name} is there already.`);
  const { upload, parts } = await readParts(ctx, begun.upload);
  if (!upload.multipartId) throw new Error(`The upload of ${name} did not begin.`);
  for (const number of missingParts(upload, parts)) {
    const from = (number - 1) * upload.partSize;
    await ctx.store.uploadPart(upload.storageKey, upload.multipartId, number, bytes.subarray(from, from + partLength(upload, number)));
  }
  return (await completeUpload(ctx, upload)).id;
}

/** The commission's frames by name: "HL_0412" finds HL_0412.jpg. */
export async function framesByName(commissionId: string): Promise<(stem: string) => Frame> {
  const frames = await Frame.query().where({ commissionId }).whereNull('deletedAt');
  return (stem) => {
    const frame = frames.find(({ name }) => name.startsWith(`${stem}.`));
    if (!frame) throw new Error(`There is no frame ${stem}.`);
    return frame;
  };
}
