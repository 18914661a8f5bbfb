import type { IncomingMessage, ServerResponse } from 'node:http';

const METHODS = 'GET, HEAD, PUT, POST, DELETE';
const EXPOSED = 'ETag, Content-Length, Content-Range, Accept-Ranges, Last-Modified, x-amz-request-id';

/** Adds what a browser on one of the allowed origins needs to see the answer. False for every other origin. */
export function allowOrigin(req: IncomingMessage, res: ServerResponse, origins: string[]): boolean {
  const { origin } = req.headers;
  res.setHeader('vary', 'Origin, Access-Control-Request-Method, Access-Control-Request-Headers');
  if (origin === undefined || !(origins.includes(origin) || origins.includes('*'))) return false;
  res.setHeader('access-control-allow-origin', origin);
  res.setHeader('access-control-expose-headers', EXPOSED);
  return true;
}

/** Answers a browser's preflight; the request itself still has to be signed. */
export function answerPreflight(req: IncomingMessage, res: ServerResponse, allowed: boolean): void {
  const asked = req.headers['access-control-request-headers'];
  const method = req.headers['access-control-request-method'] ?? '';
  if (!allowed || !METHODS.split(', ').includes(method)) {
    res.writeHead(403).end();
    return;
  }
  res.setHeader('access-control-allow-methods', METHODS);
  if (asked !== undefined) res.setHeader('access-control-allow-headers', asked);
  res.setHeader('access-control-max-age', '3600');
  res.writeHead(200).end();
}
