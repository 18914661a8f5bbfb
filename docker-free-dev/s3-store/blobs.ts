import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import fsp from 'node:fs/promises';
import path from 'node:path';
import { pipeline } from 'node:stream/promises';

/** What is read or written at a time: each costs a hand-over to a thread and back, which in small bites takes longer than the disk. */
const BITE = 1024 * 1024;

/**
 * Files of raw bytes under random names: object keys never become paths. A blob counts only once the journal names
 * it; what a killed process wrote and never named is removed by the next start.
 */
export class Blobs {
  private readonly root: string;
  private readonly sync: boolean;
  private readonly readers = new Map<string, number>();
  private readonly doomed = new Set<string>();

  /** @param sync true: bytes reach the disk before a write counts as done. */
  constructor(root: string, sync: boolean) {
    this.root = root;
    this.sync = sync;
    for (let shelf = 0; shelf < 256; shelf += 1) fs.mkdirSync(path.join(root, shelf.toString(16).padStart(2, '0')), { recursive: true });
  }

  private file(id: string): string {
    return path.join(this.root, id.slice(0, 2), id);
  }

  /** Writes a stream into a new blob and returns its name; nothing stays behind where the stream fails. */
  async write(source: AsyncIterable<Buffer>): Promise<string> {
    const id = randomBytes(16).toString('hex');
    try {
      await pipeline(source, fs.createWriteStream(this.file(id), { flags: 'wx', mode: 0o600, flush: this.sync, highWaterMark: BITE }));
    } catch (error) {
      await fsp.rm(this.file(id), { force: true });
      throw error;
    }
    return id;
  }

  /** A second name for the same bytes. */
  async copy(id: string): Promise<string> {
    const copy = randomBytes(16).toString('hex');
    await fsp.link(this.file(id), this.file(copy)).catch(() => fsp.copyFile(this.file(id), this.file(copy)));
    return copy;
  }

  /** Bytes from `start` to `end`, both included. */
  read(id: string, start: number, end: number): AsyncIterable<Buffer> {
    return fs.createReadStream(this.file(id), { start, end, highWaterMark: BITE });
  }

  /** Keeps blobs readable until the returned function is called, even when they are removed meanwhile. */
  hold(ids: string[]): () => void {
    for (const id of ids) this.readers.set(id, (this.readers.get(id) ?? 0) + 1);
    return () => {
      for (const id of ids) this.release(id);
    };
  }

  private release(id: string): void {
    const left = (this.readers.get(id) ?? 1) - 1;
    if (left > 0) return void this.readers.set(id, left);
    this.readers.delete(id);
    if (this.doomed.delete(id)) this.unlink(id);
  }

  /** Removes blobs; those being read go when their last reader has finished. */
  remove(ids: string[]): void {
    for (const id of ids) {
      if (this.readers.has(id)) this.doomed.add(id);
      else this.unlink(id);
    }
  }

  private unlink(id: string): void {
    // A file that stays behind is swept at the next start, so a failure here harms nobody.
    fs.rm(this.file(id), { force: true }, () => undefined);
  }

  /** Removes every file that is not in `named`: leftovers of writes that a killed process never finished. */
  async sweep(named: Set<string>): Promise<void> {
    for (const shelf of await fsp.readdir(this.root)) {
      for (const id of await fsp.readdir(path.join(this.root, shelf))) {
        if (!named.has(id)) await fsp.rm(this.file(id), { force: true });
      }
    }
  }
}
