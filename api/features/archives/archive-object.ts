import { problem } from '../../middleware/problem.ts';
import type { Archive } from '../../models/Archive.ts';
import type { StoredObject } from '../downloads/send-object.ts';

/** An archive as a download. @throws Problem 409 until it is ready */
export function archiveObject(archive: Archive): StoredObject {
  const { storageKey: key, sizeBytes: size, sha256, readyAt } = archive;
  if (archive.state !== 'ready' || size === null || sha256 === null || !readyAt) {
    throw problem(409, 'The archive is still being built.', { code: 'not-ready' });
  }
  return { key, size, sha256, modified: readyAt, name: `${archive.name}.zip`, mediaType: 'application/zip' };
}
