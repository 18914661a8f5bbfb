import type { Readable } from 'node:stream';
import { cleanFileName, distinctNames } from '../../domain/file-names.ts';
import { sha256Manifest } from '../../domain/manifest.ts';
import { zipLength } from '../../domain/zip-layout.ts';

/** A file that goes into an archive: what the row says of it, and how its bytes are opened. */
export interface ArchiveFile {
  name: string;
  size: number;
  /** 64 hexadecimal digits; the bytes are checked against it while they are written. */
  sha256: string;
  /** The time the entry bears. The same rows give the same archive, byte for byte. */
  date: Date;
  open(signal: AbortSignal): Promise<Readable>;
}

export interface ArchiveEntry extends ArchiveFile {
  /** The whole path inside the archive. */
  path: string;
}

export interface ArchivePlan {
  entries: ArchiveEntry[];
  manifest: { path: string; content: Buffer; date: Date };
  /** The exact length of the archive in bytes. */
  length: number;
}

/** The list of checksums inside every archive; the ending lets it open with a double click everywhere. */
export const MANIFEST_NAME = 'SHA256SUMS.txt';

/**
 * Lays an archive out before a byte is written: one folder, clean and distinct names in the order given, and at the end a
 * list of checksums that `sha256sum -c SHA256SUMS.txt` understands inside the folder.
 */
export function planArchive(folder: string, files: readonly ArchiveFile[], date: Date): ArchivePlan {
  const inside = cleanFileName(folder, 'pictures');
  const names = distinctNames(
    files.map((file) => cleanFileName(file.name)),
    [MANIFEST_NAME],
  );
  const entries = files.map((file, index) => ({ ...file, path: `${inside}/${names[index]}` }));
  const lines = entries.map((entry, index) => ({ sha256: entry.sha256, name: names[index] ?? '' }));
  const content = Buffer.from(sha256Manifest(lines));
  const manifest = { path: `${inside}/${MANIFEST_NAME}`, content, date };
  const sizes = [...entries.map(({ path, size }) => ({ name: path, size })), { name: manifest.path, size: content.length }];
  return { entries, manifest, length: zipLength(sizes, { buffered: (entry) => entry.name === manifest.path }) };
}
