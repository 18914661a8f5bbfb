import { randomUUID } from 'node:crypto';
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { RequestHandler } from 'express';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';

/** Addresses carry tokens and seals; the log keeps the path, with a link's token blotted out, and no query. */
export function loggedPath(url: string): string {
  return (url.split('?')[0] ?? '').replace(/(\/(?:open|look|begin|join|reset-password|confirm-email)\/)[^/]+/, '$1…');
}

/** A JSON line a request with an id, which is also in the answer's X-Request-Id. No addresses, no cookies, no queries. */
export function requestLog(log: Logger): RequestHandler {
  return pinoHttp({
    logger: log,
    genReqId: (_req: IncomingMessage, res: ServerResponse) => {
      const id = randomUUID();
      res.setHeader('X-Request-Id', id);
      return id;
    },
    autoLogging: { ignore: (req) => req.url === '/healthz' || (req.url ?? '').startsWith('/pictures/') },
    serializers: {
      req: (req: { id: string; method: string; url: string }) => ({ id: req.id, method: req.method, path: loggedPath(req.url) }),
      res: (res: { statusCode: number }) => ({ status: res.statusCode }),
    },
    customLogLevel: (_req, res, error) => (error || res.statusCode >= 500 ? 'error' : 'info'),
  });
}
