import fs from 'node:fs';
import path from 'node:path';

const LIMIT_BYTES = 20 * 1024 * 1024;

/** Appends lines to a file; at 20 MB the file becomes <name>.1 and a new one begins. */
export class LogFile {
  readonly file: string;
  private handle: number;
  private bytes: number;

  constructor(dir: string, name: string) {
    fs.mkdirSync(dir, { recursive: true, mode: 0o700 });
    this.file = path.join(dir, `${name}.log`);
    this.handle = fs.openSync(this.file, 'a', 0o600);
    this.bytes = fs.fstatSync(this.handle).size;
  }

  write(line: string): void {
    this.bytes += fs.writeSync(this.handle, `${line}\n`);
    if (this.bytes < LIMIT_BYTES) return;
    fs.closeSync(this.handle);
    fs.renameSync(this.file, `${this.file}.1`);
    this.handle = fs.openSync(this.file, 'a', 0o600);
    this.bytes = 0;
  }

  /** The lines since a size, for the sentence that says why something ended. */
  linesSince(bytes: number): string[] {
    const text = fs.readFileSync(this.file).subarray(bytes).toString('utf8');
    return text.split('\n').filter((line) => line.trim() !== '');
  }

  get size(): number {
    return this.bytes;
  }
}
