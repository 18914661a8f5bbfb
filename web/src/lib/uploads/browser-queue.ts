import { Gate } from './gate.ts';
import { hashPool, type Hasher } from './hash-pool.ts';
import { httpTransport, type UploadPurpose } from './http-transport.ts';
import { nothingKept, unfinishedInBrowser } from './unfinished.ts';
import { UploadQueue } from './upload-queue.ts';

const queues = new Map<string, UploadQueue>();
/** Four requests at a time over all commissions, as the browser has only six lines to one server. */
const gate = new Gate();
let hasher: Hasher | undefined;

/**
 * The queue of a commission and purpose. It outlives the page that shows it: uploads go on while the photographer is
 * elsewhere in Oriel. What an earlier visit left is brought back when it is first asked for.
 */
export function uploadQueueFor(commissionId: string, purpose: UploadPurpose): UploadQueue {
  const scope = `${commissionId}/${purpose}`;
  const there = queues.get(scope);
  if (there) return there;
  hasher ??= hashPool();
  const unfinished = typeof indexedDB === 'undefined' ? nothingKept : unfinishedInBrowser(scope);
  const queue = new UploadQueue({ transport: httpTransport(commissionId, purpose), hasher, gate, unfinished });
  queues.set(scope, queue);
  if (queues.size === 1) watchBrowser();
  void restoreOnce(scope, queue);
  return queue;
}

/**
 * Brings back what an earlier visit left. Two tabs of one commission would both send it, so the first takes it; the
 * second takes over when that one is closed.
 */
async function restoreOnce(scope: string, queue: UploadQueue): Promise<void> {
  if (!('locks' in navigator)) return queue.restore();
  await navigator.locks.request(`oriel-uploads/${scope}`, async () => {
    await queue.restore();
    await new Promise(() => undefined);
  });
}

function watchBrowser(): void {
  const all = (act: (queue: UploadQueue) => void) => queues.forEach(act);
  all((queue) => queue.setOnline(navigator.onLine));
  window.addEventListener('online', () => all((queue) => queue.setOnline(true)));
  window.addEventListener('offline', () => all((queue) => queue.setOnline(false)));
  window.addEventListener('beforeunload', (event) => {
    // The browser asks in its own words whether the page may be left.
    if ([...queues.values()].some((queue) => queue.store.totals().running)) event.preventDefault();
  });
}
