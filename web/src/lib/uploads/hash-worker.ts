import { createSHA256 } from 'hash-wasm';

/** Bytes of a file that are in memory at once. */
const SLICE = 4 * 1024 * 1024;

/** What the page asks: the SHA-256 of a file, under a number that comes back with the answer. */
export interface HashQuestion {
  number: number;
  file: Blob;
}

/** What the worker answers: the sum in lower-case hex, or why the file cannot be read. */
export type HashAnswer = { number: number; kind: 'sum'; sha256: string } | { number: number; kind: 'unreadable'; reason: string };

async function sum(question: HashQuestion): Promise<void> {
  const { number, file } = question;
  const hasher = await createSHA256();
  for (let at = 0; at < file.size; at += SLICE) {
    const bytes = await file.slice(at, Math.min(at + SLICE, file.size)).arrayBuffer();
    hasher.update(new Uint8Array(bytes));
  }
  answer({ number, kind: 'sum', sha256: hasher.digest('hex') });
}

function answer(message: HashAnswer): void {
  self.postMessage(message);
}

self.addEventListener('message', (event: MessageEvent<HashQuestion>) => {
  sum(event.data).catch((error: unknown) => {
    answer({ number: event.data.number, kind: 'unreadable', reason: String(error) });
  });
});
