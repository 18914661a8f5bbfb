import fs from 'node:fs/promises';
import path from 'node:path';
import type { Problem } from './findings.ts';

/** What is taken for a picture in a folder; a file that is named is looked at whatever it is called. */
const PICTURES = /\.(jpe?g|tiff?|png|webp|avif|dng|nef|nrw|cr2|arw|pef|3fr|iiq)$/i;

export interface Gathered {
  files: string[];
  problems: Problem[];
}

async function inFolder(folder: string): Promise<string[]> {
  const entries = await fs.readdir(folder, { withFileTypes: true, recursive: true });
  return entries
    .filter((entry) => entry.isFile() && PICTURES.test(entry.name) && !entry.name.startsWith('.'))
    .map((entry) => path.join(entry.parentPath, entry.name))
    .sort((one, two) => one.localeCompare(two, 'en', { numeric: true }));
}

function sentence(error: unknown): string {
  const { code } = error as NodeJS.ErrnoException;
  if (code === 'ENOENT') return 'There is no such file.';
  return code === 'EACCES' || code === 'EPERM' ? 'It may not be read.' : 'It cannot be read.';
}

async function gatherOne(named: string): Promise<Gathered> {
  try {
    const found = await fs.stat(named);
    if (found.isFile()) return { files: [named], problems: [] };
    if (!found.isDirectory()) return { files: [], problems: [{ file: named, says: 'It is neither a file nor a folder.' }] };
    const files = await inFolder(named);
    return { files, problems: files.length > 0 ? [] : [{ file: named, says: 'There are no pictures in this folder.' }] };
  } catch (error) {
    return { files: [], problems: [{ file: named, says: sentence(error) }] };
  }
}

/** The files that are meant, each once, and a sentence about each name that leads to none. */
export async function gatherFiles(names: readonly string[]): Promise<Gathered> {
  const all = await Promise.all(names.map(gatherOne));
  const files = new Map(all.flatMap((one) => one.files).map((file) => [path.resolve(file), file]));
  return { files: [...files.values()], problems: all.flatMap((one) => one.problems) };
}
