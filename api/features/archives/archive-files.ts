import type { Context } from '../../context.ts';
import { splitExtension } from '../../domain/file-names.ts';
import type { Archive } from '../../models/Archive.ts';
import { DeliveryFile } from '../../models/DeliveryFile.ts';
import type { FinalVersion } from '../../models/FinalVersion.ts';
import { Pick as PickRow } from '../../models/Pick.ts';
import { findWebSize } from '../finals/web-size.ts';
import { framesOfPick, framesOfPicks } from '../pick-lists/picked-frames.ts';
import type { ArchiveFile } from './plan-archive.ts';

/** The files an archive is made of, in the order they are shown. The web sizes that are missing are made on the way. */
export async function archiveFiles(ctx: Context, archive: Archive, commissionId: string, signal: AbortSignal): Promise<ArchiveFile[]> {
  if (archive.kind === 'picks') return pickedOriginals(ctx, archive);
  const files = await deliveryFiles(ctx, archive);
  if (archive.kind === 'full') return files.map(({ name, finalVersion }) => original(ctx, finalVersion, name));
  const small: ArchiveFile[] = [];
  for (const { name, finalVersion } of files) {
    const { key, size, sha256 } = await findWebSize(ctx, finalVersion, commissionId, signal);
    small.push({
      name: `${splitExtension(name)[0]}.jpg`,
      size,
      sha256,
      date: finalVersion.createdAt,
      open: (stop) => ctx.store.get(key, undefined, stop),
    });
  }
  return small;
}

function original(ctx: Context, row: Pick<FinalVersion, 'sizeBytes' | 'sha256' | 'storageKey' | 'createdAt'>, name: string): ArchiveFile {
  return {
    name,
    size: row.sizeBytes,
    sha256: row.sha256,
    date: row.createdAt,
    open: (signal) => ctx.store.get(row.storageKey, undefined, signal),
  };
}

async function deliveryFiles(ctx: Context, archive: Archive): Promise<(DeliveryFile & { finalVersion: FinalVersion })[]> {
  const files = await DeliveryFile.within(archive, ctx.knex)
    .where({ deliveryId: archive.deliveryId ?? '' })
    .orderBy(['position', 'id'])
    .withGraphFetched('finalVersion');
  return files as (DeliveryFile & { finalVersion: FinalVersion })[];
}

async function pickedOriginals(ctx: Context, archive: Archive): Promise<ArchiveFile[]> {
  const picks = await PickRow.within(archive, ctx.knex)
    .where({ pickListId: archive.pickListId ?? '' })
    .orderBy('number');
  const frames = await framesOfPicks(archive, picks, ctx.knex);
  return picks.flatMap((pick) => framesOfPick(pick, frames).map((frame) => original(ctx, frame, frame.name)));
}
