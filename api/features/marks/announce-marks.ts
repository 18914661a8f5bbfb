import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';

/** Marks of so many milliseconds are told in one go: at the end of a meeting twenty people mark at once. */
const GATHER_MS = 120;
const waiting = new Set<string>();

/** Tells everybody who looks at a sheet that its marks changed. They ask for the marks anew, so many changes may share one call. */
export function announceMarks(ctx: Context, sheetId: string): void {
  if (waiting.has(sheetId)) return;
  waiting.add(sheetId);
  setTimeout(() => {
    waiting.delete(sheetId);
    announce(ctx.knex, `sheet:${sheetId}`, { what: 'marks' }).catch((error: unknown) =>
      ctx.log.warn({ error: String(error) }, 'marks were not announced'),
    );
  }, GATHER_MS).unref();
}
