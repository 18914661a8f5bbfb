import type { Context } from '../../context.ts';
import { problem } from '../../middleware/problem.ts';

const LINE_CODES = ['ECONNREFUSED', 'ECONNRESET', 'EPIPE', 'ETIMEDOUT', 'ENOTFOUND', 'EAI_AGAIN', 'UND_ERR_SOCKET'];

/** Whether an error came from the store or from the line to it, not from our own code or the database. */
function isOfStore(error: unknown): boolean {
  const { $metadata, code, name } = (error ?? {}) as { $metadata?: unknown; code?: string; name?: string };
  return $metadata !== undefined || LINE_CODES.includes(code ?? '') || name === 'TimeoutError';
}

/** Work that needs the store: while that does not answer, the browser is asked to come again. @throws Problem 503 */
export async function withStore<T>(ctx: Context, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!isOfStore(error)) throw error;
    ctx.log.warn({ err: error }, 'the store did not answer');
    throw problem(503, 'The file store does not answer just now. Nothing is lost; it is tried again.', { retryAfter: 2 });
  }
}
