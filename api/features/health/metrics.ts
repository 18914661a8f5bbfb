import { createServer, type Server } from 'node:http';
import type { RequestHandler } from 'express';
import { collectDefaultMetrics, Gauge, Histogram, Registry } from 'prom-client';
import type { Context } from '../../context.ts';

/** The figures of one process for Prometheus. */
export interface Metrics {
  registry: Registry;
  /** Times every request by method, route and status. */
  observe: RequestHandler;
}

export function createMetrics(ctx: Context): Metrics {
  const registry = new Registry();
  collectDefaultMetrics({ register: registry });
  const seconds = new Histogram({
    name: 'oriel_request_seconds',
    help: 'Time to answer a request',
    labelNames: ['method', 'route', 'status'],
    buckets: [0.005, 0.02, 0.05, 0.1, 0.3, 1, 3, 10],
    registers: [registry],
  });
  new Gauge({
    name: 'oriel_jobs_waiting',
    help: 'Jobs that wait or run',
    registers: [registry],
    async collect() {
      const { rows } = await ctx.knex.raw<{ rows: { waiting: number }[] }>('select count(*)::int as waiting from graphile_worker.jobs');
      this.set(rows[0]?.waiting ?? 0);
    },
  });
  const observe: RequestHandler = (req, res, next) => {
    const end = seconds.startTimer();
    res.once('finish', () => end({ method: req.method, route: routeOf(req), status: String(res.statusCode) }));
    next();
  };
  return { registry, observe };
}

/** The pattern of the route, never the address itself: ids would make a figure of their own each. */
function routeOf(req: { baseUrl: string; route?: { path?: unknown } }): string {
  return typeof req.route?.path === 'string' ? req.baseUrl.replace(/[0-9a-f-]{36}/g, ':id') + req.route.path : 'other';
}

/** Serves /metrics on a port of its own, which is not for the public. */
export async function serveMetrics(registry: Registry, host: string, port: number): Promise<Server> {
  const server = createServer((req, res) => {
    if (req.url !== '/metrics') return void res.writeHead(404).end();
    registry.metrics().then(
      (text) => res.writeHead(200, { 'content-type': registry.contentType }).end(text),
      () => res.writeHead(503).end(),
    );
  });
  await new Promise<void>((resolve, reject) => server.once('error', reject).listen(port, host, resolve));
  return server;
}
