import type { ChildProcess } from 'node:child_process';
import type { RunningPostgres } from '../../docker-free-dev/postgres.ts';
import { isAlive } from '../../docker-free-dev/processes.ts';
import { say, warn } from './say.ts';
import type { Supervised } from './supervised.ts';

/** Two signals so close together are one: the terminal and npm both pass Ctrl-C on. */
const SAME_SIGNAL_MS = 700;

/** Everything this start has running, and the way to end it in order. */
export class Running {
  /** API, worker, page server: they use the services, so they go first. */
  readonly programs: Supervised[] = [];
  services: Supervised | null = null;
  database: RunningPostgres | null = null;
  releaseFolder: () => void = () => undefined;
  /** A child that does one thing and ends, such as making the demo. */
  errand: ChildProcess | null = null;
  private stopping: Promise<void> | null = null;

  get isStopping(): boolean {
    return this.stopping !== null;
  }

  /** Between two steps of a start: @throws where somebody stopped it meanwhile */
  goOn(): void {
    if (this.isStopping) throw new Error('Stopped while starting.');
  }

  stop(): Promise<void> {
    this.stopping ??= this.stopInOrder();
    return this.stopping;
  }

  private async stopInOrder(): Promise<void> {
    this.errand?.kill('SIGTERM');
    await Promise.all(this.programs.map((program) => program.stop(8000)));
    await this.services?.stop(5000);
    await this.database?.stop();
    this.releaseFolder();
  }

  /** Ends everything at once. The database recovers at its next start by itself. */
  kill(): void {
    this.errand?.kill('SIGKILL');
    for (const program of [...this.programs, this.services]) program?.kill();
    if (this.database && isAlive(this.database.pid)) process.kill(this.database.pid, 'SIGQUIT');
    this.releaseFolder();
  }

  /** Ctrl-C stops in order, a second one at once. */
  listenForSignals(): void {
    let firstAt = 0;
    const onSignal = () => {
      if (firstAt === 0) {
        firstAt = Date.now();
        say('\nStopping. Ctrl-C again ends everything at once.');
        void this.stop().then(
          () => process.exit(0),
          (error: unknown) => {
            warn(`Not everything stopped: ${error instanceof Error ? error.message : String(error)}`);
            process.exit(1);
          },
        );
      } else if (Date.now() - firstAt > SAME_SIGNAL_MS) {
        this.kill();
        process.exit(130);
      }
    };
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.on(signal, onSignal);
  }
}
