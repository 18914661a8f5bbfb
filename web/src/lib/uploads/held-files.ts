import type { UploadItem } from './upload-item.ts';

/** What Chromium adds to handles; other browsers do not keep them over a reload. */
interface AskingHandle {
  queryPermission?(wish: { mode: 'read' }): Promise<PermissionState>;
  requestPermission?(wish: { mode: 'read' }): Promise<PermissionState>;
}

/**
 * Opens the files of an earlier visit through their handles.
 * @param ask ask the person for permission; only allowed within a click
 * @returns the files that could be opened and are still what they were
 */
export async function openHeld(items: Iterable<UploadItem>, ask: boolean): Promise<Map<UploadItem, File>> {
  const opened = new Map<UploadItem, File>();
  const all = [...items];
  // A folder's permission covers its files, so that a card of a thousand files is one question.
  if (ask) for (const root of new Set(all.map((item) => item.root))) if (root) await allowed(root, true);
  for (const item of all) {
    const file = item.handle && (await open(item.handle, ask));
    if (file && sameAs(item, file)) opened.set(item, file);
  }
  return opened;
}

async function open(handle: FileSystemFileHandle, ask: boolean): Promise<File | undefined> {
  try {
    if (!(await allowed(handle, ask))) return undefined;
    return await handle.getFile();
  } catch {
    // Moved, renamed, on a card that is not in the reader: the person chooses it again.
    return undefined;
  }
}

async function allowed(handle: FileSystemHandle & AskingHandle, ask: boolean): Promise<boolean> {
  const state = (await handle.queryPermission?.({ mode: 'read' })) ?? 'granted';
  if (state !== 'prompt' || !ask) return state === 'granted';
  return (await handle.requestPermission?.({ mode: 'read' })) === 'granted';
}

function sameAs(item: UploadItem, file: File): boolean {
  return file.name === item.name && file.size === item.size && file.lastModified === item.lastModified;
}
