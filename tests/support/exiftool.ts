import { execFile } from 'node:child_process';
import { promisify } from 'node:util';

const run = promisify(execFile);

/** Debian's exiftool (libimage-exiftool-perl): the outside reader and writer of metadata. */
export async function exiftool(...args: string[]): Promise<string> {
  const { stdout } = await run('exiftool', args, { maxBuffer: 64 * 1024 * 1024 });
  return stdout;
}

/** Writes tags into a file in place, without minor warnings standing in the way. */
export async function writeTags(path: string, ...tags: string[]): Promise<void> {
  await exiftool('-q', '-m', '-overwrite_original', ...tags, path);
}

/** Tags of a file by "Group:Name", as numbers where they are numbers. */
export async function readTags(path: string, ...options: string[]): Promise<Record<string, unknown>> {
  const [tags] = JSON.parse(await exiftool('-j', '-n', '-G1', ...options, path)) as [Record<string, unknown>];
  return tags;
}

/** What exiftool takes out of a file, byte for byte. */
export async function extract(path: string, tag: string): Promise<Buffer> {
  const { stdout } = await run('exiftool', ['-b', `-${tag}`, path], { encoding: 'buffer', maxBuffer: 64 * 1024 * 1024 });
  return stdout;
}
