import type { UploadItem } from './upload-item.ts';

/**
 * Whether the item's file can still be read. A browser reports a request whose body it could not read as a lost line,
 * which would be tried for ever.
 */
export async function isReadable(item: UploadItem): Promise<boolean> {
  try {
    await item.file?.slice(0, 1).arrayBuffer();
    return item.file !== undefined;
  } catch {
    return false;
  }
}
