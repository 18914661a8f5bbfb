import { pino, type Logger } from 'pino';
import type { Config } from '../config.ts';

/** JSON lines on standard output. Nothing that opens a door and nobody's address is ever in them. */
export function createLog(config: Config, name: 'api' | 'worker'): Logger {
  return pino({
    name,
    level: config.logLevel,
    redact: {
      paths: [
        'req.headers.cookie',
        'req.headers.authorization',
        'res.headers["set-cookie"]',
        '*.password',
        '*.token',
        '*.email',
        '*.toAddress',
        'err.config',
      ],
      remove: true,
    },
  });
}
