import type { FoundFile } from './found-file.ts';

/** Files come out in groups of this many, so that a large folder shows up while it is still being walked. */
const GROUP = 200;

type Held = { handle: Promise<FileSystemHandle | null> } | { entry: FileSystemEntry } | { file: File };

/**
 * Takes hold of what was dropped. Must be called within the drop event itself: the browser empties the DataTransfer
 * as soon as that event is over.
 * @returns the files in groups, folders walked to the bottom
 */
export function takeDrop(transfer: DataTransfer): AsyncGenerator<FoundFile[]> {
  const held: Held[] = [];
  for (const item of transfer.items) {
    const one = item.kind === 'file' ? hold(item) : undefined;
    if (one) held.push(one);
  }
  return inGroups(walkAll(held));
}

function hold(item: DataTransferItem): Held | undefined {
  // Only handles survive a reload, so they go first where the browser has them.
  if ('getAsFileSystemHandle' in item && typeof item.getAsFileSystemHandle === 'function') {
    return { handle: (item.getAsFileSystemHandle as () => Promise<FileSystemHandle | null>)() };
  }
  const entry = item.webkitGetAsEntry();
  if (entry) return { entry };
  const file = item.getAsFile();
  return file ? { file } : undefined;
}

async function* walkAll(held: Held[]): AsyncGenerator<FoundFile> {
  for (const one of held) {
    if ('file' in one) yield { file: one.file, path: one.file.name };
    else if ('entry' in one) yield* walkEntry(one.entry);
    else {
      const handle = await one.handle;
      if (handle) yield* walkHandle(handle, '');
    }
  }
}

async function* walkHandle(handle: FileSystemHandle, above: string, root?: FileSystemDirectoryHandle): AsyncGenerator<FoundFile> {
  const path = above + handle.name;
  if (handle.kind === 'file') {
    const fileHandle = handle as FileSystemFileHandle;
    yield { file: await fileHandle.getFile(), path, handle: fileHandle, ...(root && { root }) };
    return;
  }
  const folder = handle as FileSystemDirectoryHandle;
  for await (const child of folder.values()) yield* walkHandle(child, `${path}/`, root ?? folder);
}

async function* walkEntry(entry: FileSystemEntry): AsyncGenerator<FoundFile> {
  if (entry.isFile) {
    const file = await new Promise<File>((resolve, reject) => (entry as FileSystemFileEntry).file(resolve, reject));
    yield { file, path: entry.fullPath.replace(/^\//, '') };
    return;
  }
  const reader = (entry as FileSystemDirectoryEntry).createReader();
  // A reader hands out a folder piece by piece and ends with an empty piece.
  for (;;) {
    const piece = await new Promise<FileSystemEntry[]>((resolve, reject) => reader.readEntries(resolve, reject));
    if (piece.length === 0) return;
    for (const child of piece) yield* walkEntry(child);
  }
}

async function* inGroups(files: AsyncGenerator<FoundFile>): AsyncGenerator<FoundFile[]> {
  let group: FoundFile[] = [];
  for await (const file of files) {
    group.push(file);
    if (group.length < GROUP) continue;
    yield group;
    group = [];
  }
  if (group.length > 0) yield group;
}
