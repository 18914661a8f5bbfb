import { type ChildProcess, spawn } from 'node:child_process';
import readline from 'node:readline';
import { prettyFactory } from 'pino-pretty';
import { endWithUs } from '../../docker-free-dev/processes.ts';
import { LogFile } from './log-file.ts';
import { warn } from './say.ts';

export interface SupervisedOptions {
  /** Names it in sentences: "The API". */
  name: string;
  logName: string;
  logDir: string;
  args: string[];
  env: Record<string, string | undefined>;
  /** Show its lines in the terminal as well. */
  echo?: boolean;
}

/** A JSON line of the log as a person reads it; every other line as it is. */
const pretty = prettyFactory({ singleLine: true, ignore: 'pid,hostname,name', translateTime: 'HH:MM:ss' });
const readable = (line: string): string => (line.startsWith('{') ? pretty(line).trimEnd() : line);

const LONGEST_PAUSE_MS = 30_000;
const STEADY_MS = 60_000;

/** A child process that is started again, after a growing pause, when it ends by itself. */
export class Supervised {
  private readonly options: SupervisedOptions;
  private readonly log: LogFile;
  private child: ChildProcess | null = null;
  private stopping = false;
  private crashes = 0;
  private again: NodeJS.Timeout | undefined;
  private onMessage: (message: unknown) => void = () => undefined;

  constructor(options: SupervisedOptions) {
    this.options = options;
    this.log = new LogFile(options.logDir, options.logName);
  }

  get logFile(): string {
    return this.log.file;
  }

  start(): void {
    const { args, env } = this.options;
    const begun = Date.now();
    const logged = this.log.size;
    const child = spawn(process.execPath, args, {
      env: env as NodeJS.ProcessEnv,
      stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
      // A group of its own: Ctrl-C reaches us alone, and we end the children in order.
      detached: true,
    });
    const dismissGuard = endWithUs(child.pid ?? 0, 'TERM');
    this.child = child;
    child.on('message', (message) => this.onMessage(message));
    child.once('error', (error) => this.write(error.message));
    child.once('exit', (code, signal) => {
      dismissGuard();
      this.ended(signal ?? `code ${code}`, Date.now() - begun, this.log.linesSince(logged));
    });
    for (const stream of [child.stdout, child.stderr]) {
      if (stream) readline.createInterface({ input: stream }).on('line', (line) => this.write(line));
    }
  }

  /** Resolves with the first message the child sends; a child that crashes first is started again meanwhile. */
  firstMessage(): Promise<unknown> {
    return new Promise((resolve) => (this.onMessage = resolve));
  }

  private write(line: string): void {
    this.log.write(line);
    if (this.options.echo) console.log(`${this.options.logName} | ${readable(line)}`);
    else if (isSerious(line)) warn(`${this.options.name} reports an error: ${messageOf(line)} (${this.log.file})`);
  }

  private ended(how: string, livedMs: number, lines: string[]): void {
    this.child = null;
    if (this.stopping) return;
    this.crashes = livedMs > STEADY_MS ? 1 : this.crashes + 1;
    const pause = Math.min(LONGEST_PAUSE_MS, 500 * 2 ** (this.crashes - 1));
    warn(`${this.options.name} ended by itself (${how}) and is started again in ${pause / 1000} s.`);
    warn(`  ${reasonIn(lines)} (${this.log.file})`);
    this.again = setTimeout(() => this.start(), pause);
  }

  /** Asks it to end and waits; after `patienceMs` it is ended. */
  async stop(patienceMs: number): Promise<void> {
    this.stopping = true;
    clearTimeout(this.again);
    const { child } = this;
    if (!child) return;
    const ended = new Promise((resolve) => child.once('exit', resolve));
    child.kill('SIGTERM');
    const timer = setTimeout(() => this.kill(), patienceMs);
    await ended;
    clearTimeout(timer);
  }

  /** Ends it at once, with every process of its group. */
  kill(): void {
    this.stopping = true;
    clearTimeout(this.again);
    const pid = this.child?.pid;
    if (pid === undefined) return;
    try {
      process.kill(-pid, 'SIGKILL');
    } catch {
      // Gone already.
    }
  }
}

/** The line that says most about why a process ended: the first error it wrote, else the last line. */
function reasonIn(lines: string[]): string {
  const line = lines.find((one) => /^\S*Error\b/.test(one) || isSerious(one)) ?? lines.at(-1) ?? 'It wrote nothing.';
  return messageOf(line);
}

const levelOf = (line: string): number => Number(/^\{"level":(\d+)/.exec(line)?.[1] ?? 0);
const isSerious = (line: string): boolean => levelOf(line) >= 50;

function messageOf(line: string): string {
  try {
    const { msg, err } = JSON.parse(line) as { msg?: string; err?: { message?: string } };
    return [msg, err?.message].filter(Boolean).join(': ') || line;
  } catch {
    return line;
  }
}
