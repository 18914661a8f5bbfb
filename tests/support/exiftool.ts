import { type ChildProcessWithoutNullStreams, spawn } from 'node:child_process';
import { afterAll } from 'vitest';

/** Debian's exiftool (libimage-exiftool-perl), kept open for a test file: its start takes longer than its work. */
class OpenExiftool {
  readonly #child: ChildProcessWithoutNullStreams = spawn('exiftool', ['-stay_open', 'True', '-@', '-']);
  #out = Buffer.alloc(0);
  #errors = '';
  #heard: () => void = () => undefined;
  #count = 0;
  #last: Promise<unknown> = Promise.resolve();

  constructor() {
    this.#child.stdout.on('data', (chunk: Buffer) => {
      this.#out = Buffer.concat([this.#out, chunk]);
      this.#heard();
    });
    this.#child.stderr.on('data', (chunk: Buffer) => (this.#errors += chunk.toString()));
    this.#child.on('error', () => this.#heard());
  }

  /** One call after the other; gives what exiftool prints. */
  run(args: string[]): Promise<Buffer> {
    const call = this.#last.then(() => this.#call(args));
    this.#last = call.catch(() => undefined);
    return call;
  }

  async #call(args: string[]): Promise<Buffer> {
    const end = `{ready${++this.#count}}\n`;
    this.#out = Buffer.alloc(0);
    this.#errors = '';
    this.#child.stdin.write(`${args.join('\n')}\n-execute${this.#count}\n`);
    while (!this.#out.subarray(-end.length).equals(Buffer.from(end))) {
      if (this.#child.exitCode !== null || this.#child.pid === undefined) throw new Error(`exiftool has ended: ${this.#errors}`);
      await new Promise<void>((resolve) => (this.#heard = resolve));
    }
    if (/^Error/m.test(this.#errors)) throw new Error(this.#errors);
    return this.#out.subarray(0, -end.length);
  }

  async stop(): Promise<void> {
    const ended = new Promise((resolve) => this.#child.once('exit', resolve));
    this.#child.stdin.write('-stay_open\nFalse\n');
    await ended;
  }
}

let open: OpenExiftool | undefined;
afterAll(async () => {
  await open?.stop();
  open = undefined;
});

const run = (args: string[]) => (open ??= new OpenExiftool()).run(args);

/** The outside reader and writer of metadata; gives what it prints. */
export async function exiftool(...args: string[]): Promise<string> {
  return (await run(args)).toString();
}

/** Writes tags into a file in place, without minor warnings standing in the way. */
export async function writeTags(path: string, ...tags: string[]): Promise<void> {
  await run(['-q', '-m', '-overwrite_original', ...tags, path]);
}

/** Tags of a file by "Group:Name", as numbers where they are numbers. */
export async function readTags(path: string, ...options: string[]): Promise<Record<string, unknown>> {
  const [tags] = JSON.parse(await exiftool('-j', '-n', '-G1', ...options, path)) as [Record<string, unknown>];
  return tags;
}

/** What exiftool takes out of a file, byte for byte. */
export function extract(path: string, tag: string): Promise<Buffer> {
  return run(['-b', `-${tag}`, path]);
}
