import { Router } from 'express';
import type { Context } from '../../context.ts';

/** 200 once database and store answer; 503 with the reason before. */
export function healthRoutes(ctx: Context): Router {
  const router = Router();
  router.get('/healthz', async (_req, res) => {
    const checks = { database: () => ctx.knex.raw('select 1'), store: () => ctx.store.ready() };
    const waits: string[] = [];
    for (const [name, check] of Object.entries(checks)) {
      await check().catch((error: unknown) => waits.push(`${name}: ${error instanceof Error ? error.name : 'no answer'}`));
    }
    res.setHeader('Cache-Control', 'no-store');
    if (waits.length > 0) res.setHeader('Retry-After', '2');
    res.status(waits.length > 0 ? 503 : 200).json({ ready: waits.length === 0, waitingFor: waits });
  });
  return router;
}
