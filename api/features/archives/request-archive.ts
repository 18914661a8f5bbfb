import type { Transaction } from 'objection';
import type { ArchiveState } from '../../contract/deliveries.ts';
import { enqueue } from '../../jobs/queue.ts';
import { Archive } from '../../models/Archive.ts';
import { archiveKey } from '../../services/storage-keys.ts';

/** What an archive is made of, and what its folder is called. */
export interface WantedArchive {
  studioId: string;
  commissionId: string;
  of: { deliveryId: string; kind: 'full' | 'web' } | { pickListId: string; kind: 'picks' };
  name: string;
  files: number;
}

/** Has an archive built, once: where it is there or being built already, it is given as it is; a failed one is begun again. */
export async function requestArchive(trx: Transaction, wanted: WantedArchive): Promise<Archive> {
  const parent =
    'deliveryId' in wanted.of ? { deliveryId: wanted.of.deliveryId, kind: wanted.of.kind } : { pickListId: wanted.of.pickListId };
  // The row that was there first wins; whoever comes at the same time waits for it here.
  await Archive.query(trx)
    .insert({
      studioId: wanted.studioId,
      ...wanted.of,
      name: wanted.name,
      fileCount: wanted.files,
      storageKey: archiveKey(wanted.studioId, wanted.commissionId),
    })
    .onConflict()
    .ignore();
  const archive = await Archive.within(wanted, trx).findOne(parent).forUpdate().throwIfNotFound();
  return archive.state === 'ready' ? archive : buildAgain(trx, archive);
}

/** Puts an archive that is not ready into the queue; where its job waits or runs already, nothing happens twice. */
export async function buildAgain(trx: Transaction, archive: Archive): Promise<Archive> {
  const failed = archive.state === 'failed';
  if (failed) await Archive.query(trx).findById(archive.id).patch({ state: 'building', problem: null, writtenBytes: 0 });
  await enqueue(trx, 'build-archive', { archiveId: archive.id }, { key: `build-archive:${archive.id}`, maxAttempts: 5 });
  return failed ? Archive.query(trx).findById(archive.id).throwIfNotFound() : archive;
}

/** An archive as the pages see it. */
export function presentArchive(archive: Archive): ArchiveState {
  const { kind, state, problem, name, fileCount: files, sizeBytes: size, writtenBytes: written } = archive;
  return { kind, state, problem, name, files, size, written };
}
