import fs from 'node:fs';
import readline from 'node:readline';
import type { Entry } from './entries.ts';

/**
 * Append-only list of entries, a JSON line each. A change counts from the moment its whole line is in the file, so a
 * process killed at any point leaves the state before or after it, never half.
 */
export class Journal {
  private readonly file: string;
  private readonly sync: boolean;
  private handle: number | null = null;

  constructor(file: string, sync: boolean) {
    this.file = file;
    this.sync = sync;
  }

  /** Entries in order. A last line without its end was never answered for and is dropped. */
  async *replay(): AsyncGenerator<Entry> {
    if (!fs.existsSync(this.file)) return;
    const lines = readline.createInterface({ input: fs.createReadStream(this.file, 'utf8'), crlfDelay: Infinity });
    let number = 0;
    let torn: number | null = null;
    for await (const line of lines) {
      number += 1;
      if (torn !== null) throw new Error(`${this.file} is damaged at line ${torn}.`);
      const entry = parseEntry(line);
      if (entry) yield entry;
      else torn = number;
    }
  }

  /** Replaces the journal by the shortest one with the same outcome and opens it for appending. */
  rewrite(entries: Iterable<Entry>): void {
    const draft = `${this.file}.new`;
    const out = fs.openSync(draft, 'w', 0o600);
    for (const entry of entries) fs.writeSync(out, lineOf(entry));
    fs.fsyncSync(out);
    fs.closeSync(out);
    fs.renameSync(draft, this.file);
    this.handle = fs.openSync(this.file, 'a', 0o600);
  }

  /** One write call a line: lines of concurrent requests never mix. */
  append(entry: Entry): void {
    if (this.handle === null) throw new Error('The store has stopped.');
    fs.writeSync(this.handle, lineOf(entry));
    if (this.sync) fs.fdatasyncSync(this.handle);
  }

  close(): void {
    if (this.handle !== null) fs.closeSync(this.handle);
    this.handle = null;
  }
}

const lineOf = (entry: Entry): string => `${JSON.stringify(entry)}\n`;

function parseEntry(line: string): Entry | null {
  try {
    return JSON.parse(line) as Entry;
  } catch {
    return null;
  }
}
