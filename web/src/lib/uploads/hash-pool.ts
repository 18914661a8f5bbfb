import type { HashAnswer, HashQuestion } from './hash-worker.ts';

/** Computes the SHA-256 of files without holding them in memory. */
export interface Hasher {
  /** How many files it reads at the same time. */
  readonly width: number;
  /**
   * @returns lower-case hex
   * @throws AbortError where the signal ends it; another error where the file cannot be read
   */
  sum(file: Blob, signal: AbortSignal): Promise<string>;
}

/**
 * A hasher over a small pool of workers, started when first needed.
 * One worker a file is enough to outrun a line; more than two would only make the disk's head jump.
 */
export function hashPool(width = Math.min(2, navigator.hardwareConcurrency || 1)): Hasher {
  const idle: Worker[] = [];
  let number = 0;

  function sum(file: Blob, signal: AbortSignal): Promise<string> {
    signal.throwIfAborted();
    const worker = idle.pop() ?? new Worker(new URL('./hash-worker.ts', import.meta.url), { type: 'module' });
    number += 1;
    return ask(worker, { number, file }, signal).then(
      (sha256) => {
        idle.push(worker);
        return sha256;
      },
      (error: unknown) => {
        // A worker in the middle of a large file cannot be called back, only ended.
        worker.terminate();
        throw error;
      },
    );
  }
  return { width, sum };
}

function ask(worker: Worker, question: HashQuestion, signal: AbortSignal): Promise<string> {
  const heard = new AbortController();
  return new Promise<string>((resolve, reject) => {
    const options = { signal: heard.signal };
    worker.addEventListener(
      'message',
      (event: MessageEvent<HashAnswer>) => {
        if (event.data.number !== question.number) return;
        if (event.data.kind === 'sum') resolve(event.data.sha256);
        if (event.data.kind === 'unreadable') reject(new Error(event.data.reason));
      },
      options,
    );
    worker.addEventListener('error', (event) => reject(new Error(event.message || 'The worker broke.')), options);
    signal.addEventListener('abort', () => reject(new DOMException('Stopped.', 'AbortError')), options);
    worker.postMessage(question);
  }).finally(() => heard.abort());
}
