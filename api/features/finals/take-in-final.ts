import type { Transaction } from 'objection';
import { announce } from '../../db/live.ts';
import { enqueue } from '../../jobs/queue.ts';
import { Account } from '../../models/Account.ts';
import { Commission } from '../../models/Commission.ts';
import { Final } from '../../models/Final.ts';
import { FinalVersion } from '../../models/FinalVersion.ts';
import type { Upload } from '../../models/Upload.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { currentPicks } from './current-picks.ts';
import { findMatch, type FoundMatch } from './find-match.ts';

/** What the judging of an uploaded file found out. Pixels are upright; the time is the camera's wall clock. */
export interface JudgedFinal {
  mediaType: string;
  width: number;
  height: number;
  takenLocal: string | null;
}

/**
 * Takes an uploaded and judged file in as a final, within the caller's transaction: matches it to its pick, makes it the
 * next version of a final that is there, and has its pictures made. Called again for the same upload it changes nothing.
 */
export async function takeInFinal(trx: Transaction, upload: Upload, judged: JudgedFinal): Promise<FinalVersion> {
  // Two files of one pick may come at once: the commission's row makes them wait for each other.
  await Commission.query(trx).findById(upload.commissionId).forUpdate().throwIfNotFound();
  const known = await FinalVersion.within(upload, trx).findOne({ uploadId: upload.id });
  if (known) return known;
  const picks = await currentPicks(upload, upload.commissionId, trx);
  const found = findMatch({ originalName: upload.originalName, takenLocal: judged.takenLocal }, picks);
  const final = (await finalThatIsThere(trx, upload, found)) ?? (await newFinal(trx, upload, found));
  const version = await addVersion(trx, final, upload, judged);
  await enqueue(trx, 'make-final-pictures', { versionId: version.id }, { key: `make-final-pictures:${version.id}` });
  await tell(trx, upload, final, version, found);
  return version;
}

/** The final of the same pick; for a file without a pick, the one that came under the very same name. */
async function finalThatIsThere(trx: Transaction, upload: Upload, found: FoundMatch): Promise<Final | undefined> {
  const finals = Final.within(upload, trx).where({ commissionId: upload.commissionId }).whereNull('deletedAt');
  if (found.frameId) return finals.findOne({ frameId: found.frameId });
  if (found.doubt) return undefined;
  return finals
    .whereNull('frameId')
    .whereExists(
      FinalVersion.query(trx)
        .whereColumn('finalVersions.finalId', 'finals.id')
        .where({ originalName: upload.originalName })
        .whereNull('deletedAt'),
    )
    .first();
}

async function newFinal(trx: Transaction, upload: Upload, found: FoundMatch): Promise<Final> {
  return Final.query(trx)
    .insert({
      studioId: upload.studioId,
      commissionId: upload.commissionId,
      frameId: found.frameId,
      match: found.match,
      candidates: found.candidates,
    })
    .returning('*');
}

/** Numbers count removed versions too, so that "version 2" never means two files. */
async function addVersion(trx: Transaction, final: Final, upload: Upload, judged: JudgedFinal): Promise<FinalVersion> {
  const last = await FinalVersion.query(trx).where({ finalId: final.id }).max('number as number').first();
  return FinalVersion.query(trx)
    .insert({
      studioId: upload.studioId,
      finalId: final.id,
      uploadId: upload.id,
      number: (last?.number ?? 0) + 1,
      originalName: upload.originalName,
      name: upload.name,
      sizeBytes: upload.sizeBytes,
      sha256: upload.sha256,
      storageKey: upload.storageKey,
      createdBy: upload.createdBy,
      ...judged,
    })
    .returning('*');
}

async function tell(trx: Transaction, upload: Upload, final: Final, version: FinalVersion, found: FoundMatch): Promise<void> {
  const person = upload.createdBy ? await Account.query(trx).findById(upload.createdBy) : undefined;
  const what = version.number > 1 ? `version ${version.number} of a final` : 'a final';
  await addToRecord(trx, {
    studioId: upload.studioId,
    commissionId: upload.commissionId,
    ...(person ? { actor: { kind: 'staff' as const, accountId: person.id, name: person.name } } : {}),
    did: 'final.added',
    says: `Took in “${version.name}” as ${what}${found.doubt ? '; its pick has to be asked' : ''}`,
    about: { finalId: final.id, versionId: version.id },
  });
  const topic = `commission:${upload.commissionId}`;
  await announce(trx, topic, { what: 'final-added', finalId: final.id, versionId: version.id });
  await announce(trx, topic, { what: 'upload-done', uploadId: upload.id, frameId: null });
}
