import type { FoundFile } from './found-file.ts';
import { whyLeftOut } from './junk.ts';
import type { Unfinished } from './unfinished.ts';
import { UploadItem } from './upload-item.ts';

let count = 0;

/** Ids sort in the order in which the files came, over reloads too; the end keeps two tabs apart. */
function newId(): string {
  count += 1;
  const chance = Math.random().toString(36).slice(2, 8);
  return `${Date.now().toString(36).padStart(9, '0')}-${String(count).padStart(7, '0')}-${chance}`;
}

/** A new file of the queue, or one that is named and left out. */
export function itemOf(found: FoundFile): UploadItem {
  const { file, path } = found;
  const item = new UploadItem(newId(), file.name, path, file.size, file.lastModified);
  item.problem = whyLeftOut(file.name, file.size);
  if (item.problem !== undefined) item.stage = 'left-out';
  else item.file = file;
  item.handle = found.handle;
  item.root = found.root;
  return item;
}

/** A file that an earlier visit left. */
export function itemOfUnfinished(kept: Unfinished): UploadItem {
  const item = new UploadItem(kept.id, kept.name, kept.path, kept.size, kept.lastModified);
  item.stage = kept.problem === undefined ? 'held' : 'failed';
  item.problem = kept.problem;
  item.sha256 = kept.sha256;
  item.uploadId = kept.uploadId;
  item.handle = kept.handle;
  item.root = kept.root;
  return item;
}

/** What is kept of a file over a reload. */
export function unfinishedOf(item: UploadItem): Unfinished {
  const { id, name, path, size, lastModified, sha256, uploadId, handle, root } = item;
  return {
    id,
    name,
    path,
    size,
    lastModified,
    ...(sha256 !== undefined && { sha256 }),
    ...(uploadId !== undefined && { uploadId }),
    ...(handle && { handle }),
    ...(root && { root }),
    ...(item.stage === 'failed' && item.problem !== undefined && { problem: item.problem }),
  };
}
