import { availableParallelism } from 'node:os';
import { createRequire } from 'node:module';
import { fileURLToPath, pathToFileURL } from 'node:url';
import workerpool from 'workerpool';
import type { FrameMeasures } from '../../domain/frame-measures.ts';
import type { WatermarkSettings } from '../../domain/watermark-settings.ts';
import type { DerivativeSize } from '../derivative-sizes.ts';
import type { Derivative } from '../make-derivatives.ts';
import type { BracketFrame, Merged } from '../merge/merge-pictures.ts';
import type { WebPicture } from '../make-web-size.ts';
import { Refusal, type RefusalCode } from '../refusal.ts';
import type { Examined, Prepared } from './tasks.ts';

/** Work on pixels, done in child processes. Paths name files on this machine; a broken picture rejects with a Refusal. */
export interface Pixels {
  /** Says what a file is and how it was shot, and reads it to its end. */
  judge(path: string): Promise<Examined>;
  /** The same, and makes the file's pictures from the same decoding. */
  prepare(path: string): Promise<Prepared>;
  /** Measures a frame's largest derivative: clipping, sharpness, tilt, hash. */
  measure(picture: Buffer): Promise<FrameMeasures>;
  /** Lays a watermark over a picture's largest derivative; gives the sizes asked for, all of them where none is. */
  watermark(picture: Buffer, settings: WatermarkSettings, image: Buffer | null, sizes?: readonly DerivativeSize[]): Promise<Derivative[]>;
  /** Makes a PNG fit to be a watermark. */
  cleanWatermark(png: Buffer): Promise<{ data: Buffer; width: number; height: number }>;
  /** Makes the web size of a finished file. */
  webSize(path: string): Promise<WebPicture>;
  /** Merges the frames of a bracket, given as their largest derivatives, over the one at place `lead`. */
  merge(frames: BracketFrame[], lead: number): Promise<Merged>;
  /** Ends the children, busy or not. */
  stop(): Promise<void>;
}

export interface PixelsOptions {
  /** Children at most; one for each core where nothing is said. They start when they are needed. */
  processes?: number | undefined;
  /** A call that runs longer is ended, with its child. */
  timeoutSeconds: number;
  /** Pictures of more pixels are refused. */
  maxPixels: number;
}

/** Something went wrong with a child, not with the picture: the same call may go through when it is made again. */
export class PixelsFailure extends Error {
  override name = 'PixelsFailure';
}

/** A new child has so long to begin, on a machine that is very busy. */
const START_SECONDS = 60;

/**
 * How far the children stand back behind the API, the database and the store on the same machine, as nice values: those that take files in, for
 * which somebody waits, and those that look into what is there already.
 */
const NICE = { takingIn: 12, lookingInto: 19 };

function startPool(processes: number, nice: number): workerpool.Pool {
  const loader = pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href;
  return workerpool.pool(fileURLToPath(new URL('./child.ts', import.meta.url)), {
    workerType: 'process',
    maxWorkers: processes,
    workerTerminateTimeout: 500,
    forkArgs: [Math.max(1, Math.floor(availableParallelism() / processes)), nice].map(String),
    forkOpts: {
      execArgv: ['--import', loader],
      // Buffers as they are, not as lists of numbers in JSON.
      serialization: 'advanced',
      // Decoders of strangers' files get nothing to know: none of the installation's secrets is in their environment.
      env: { MALLOC_ARENA_MAX: '2' },
    },
  });
}

/** Errors cross the line between processes as plain data; a refusal becomes one again. */
function revive(error: unknown, task: string): Error {
  if (error instanceof workerpool.Promise.TimeoutError) return new PixelsFailure(`${task}: the process for it did not begin.`);
  if (!(error instanceof Error)) return new PixelsFailure(String(error));
  if (error.name === 'Refusal') return new Refusal((error as Error & { code: RefusalCode }).code, error.message);
  if (/terminat|disconnected|channel closed/i.test(error.message))
    return new PixelsFailure(`${task}: the process at work ended unexpectedly.`);
  return error;
}

/** A call that a child is busy with. */
class Call {
  #pid: number | undefined;
  #deadline: NodeJS.Timeout | undefined;
  tooLong = false;

  /** The child says who it is when it begins, so its start does not count. */
  begin(pid: number, seconds: number): void {
    this.#pid = pid;
    this.#deadline = setTimeout(() => {
      this.tooLong = true;
      this.kill();
    }, seconds * 1000);
  }

  /** Only SIGKILL ends a child whatever it is doing; the pool notices and makes a new one. */
  kill(): void {
    if (this.#pid !== undefined) process.kill(this.#pid, 'SIGKILL');
  }

  /** From now on the number may be that of another process. */
  end(): void {
    clearTimeout(this.#deadline);
    this.#pid = undefined;
  }
}

/** Opens the pool of child processes that all work on pixels goes through, so that no picture can harm the process that asks. */
export function createPixels(options: PixelsOptions): Pixels {
  const pool = startPool(options.processes ?? availableParallelism(), NICE.takingIn);
  // One child beside them: measuring and merging take what the others leave, and never a place from them.
  const aside = startPool(1, NICE.lookingInto);
  const limits = { pixels: options.maxPixels, bytes: Number.MAX_SAFE_INTEGER };
  const calls = new Set<Call>();
  async function run<Answer>(task: string, args: unknown[], by = pool): Promise<Answer> {
    const call = new Call();
    calls.add(call);
    try {
      const answer = by.exec(task, args, { on: ({ pid }: { pid: number }) => call.begin(pid, options.timeoutSeconds) });
      // The pool's own clock is for a child that never comes to begin.
      return (await answer.timeout((options.timeoutSeconds + START_SECONDS) * 1000)) as Answer;
    } catch (error) {
      if (call.tooLong) throw new PixelsFailure(`${task} took longer than ${options.timeoutSeconds} s and was ended.`);
      throw revive(error, task);
    } finally {
      call.end();
      calls.delete(call);
    }
  }
  return {
    judge: (path) => run('judge', [path, limits]),
    prepare: (path) => run('prepare', [path, limits]),
    measure: (picture) => run('measure', [picture], aside),
    watermark: (picture, settings, image, sizes) => run('watermark', [picture, settings, image, sizes]),
    cleanWatermark: (png) => run('cleanWatermark', [png]),
    webSize: (path) => run('webSize', [path, limits]),
    merge: (frames, lead) => run('merge', [frames, lead], aside),
    stop: async () => {
      for (const call of calls) call.kill();
      await Promise.all([pool.terminate(true), aside.terminate(true)]);
    },
  };
}
