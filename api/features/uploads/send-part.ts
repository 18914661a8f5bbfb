import type { Request } from 'express';
import type { Context } from '../../context.ts';
import type { PartReceipt } from '../../contract/uploads.ts';
import { type Problem, problem } from '../../middleware/problem.ts';
import { Upload } from '../../models/Upload.ts';
import { receivePart } from './part-storage.ts';
import { isUnknownUpload, openMultipart, partCount, partLength } from './upload-parts.ts';

/** Parts that this process holds in memory at the same time, at most: 12 of 8 MiB are 96 MiB. */
const MOST_IN_FLIGHT = 12;
/** Two browsers' worth. A studio on a slow line, or one that means harm, leaves room for the others. */
const MOST_OF_A_STUDIO = 8;
/** The studio of each part in flight. */
const inFlight: string[] = [];

function notReceiving(upload: Upload): Problem {
  return problem(409, upload.state === 'done' || upload.state === 'checking' ? 'This upload is complete.' : 'This upload has ended.', {
    code: `upload-${upload.state}`,
  });
}

function hasRoom({ studioId }: Upload): boolean {
  return inFlight.length < MOST_IN_FLIGHT && inFlight.filter((one) => one === studioId).length < MOST_OF_A_STUDIO;
}

/** Keeps an upload that still receives from being cleared away, and notices one that has ended meanwhile. */
async function touch(upload: Upload): Promise<void> {
  const still = await Upload.within(upload).patch({ updatedAt: new Date() }).where({ id: upload.id, state: 'receiving' });
  if (still === 0) throw notReceiving(await Upload.within(upload).findById(upload.id).throwIfNotFound());
}

async function toStore(ctx: Context, upload: Upload, multipartId: string, number: number, part: Buffer): Promise<void> {
  try {
    await ctx.store.uploadPart(upload.storageKey, multipartId, number, part);
  } catch (error) {
    if (isUnknownUpload(error)) {
      await touch(upload);
      // The store has lost what it had: the browser asks which parts are there and begins again.
      throw problem(409, 'The parts of this upload are no longer there. It has to be begun again.', { code: 'parts-lost' });
    }
    ctx.log.warn({ err: error, uploadId: upload.id }, 'the store did not take a part');
    throw problem(503, 'The file store does not answer just now. The part will have to be sent again.', { retryAfter: 2 });
  }
}

/**
 * Takes one part straight on to the store. Sending it again replaces it.
 * @throws Problem 404 for a number the file has not, 409 where the upload has ended, 422 for another length, 503 while too
 * many parts are in flight
 */
export async function sendPart(ctx: Context, upload: Upload, number: number, req: Request): Promise<PartReceipt> {
  if (upload.state !== 'receiving') throw notReceiving(upload);
  if (!Number.isInteger(number) || number < 1 || number > partCount(upload)) {
    throw problem(404, `This file has the parts 1 to ${partCount(upload)}.`);
  }
  if (!hasRoom(upload)) throw problem(503, 'Many parts are on their way just now.', { retryAfter: 1 });
  inFlight.push(upload.studioId);
  try {
    const { multipartId } = upload.multipartId === null ? await openMultipart(ctx, upload) : upload;
    if (multipartId === null) throw notReceiving(upload);
    const size = partLength(upload, number);
    await receivePart(req, size, (part) => toStore(ctx, upload, multipartId, number, part));
    await touch(upload);
    return { number, size };
  } finally {
    inFlight.splice(inFlight.indexOf(upload.studioId), 1);
  }
}
