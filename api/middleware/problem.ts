import type { ErrorRequestHandler, RequestHandler } from 'express';
import multer from 'multer';
import type { Logger } from 'pino';
import { ZodError } from 'zod';
import { Refusal } from '../imaging/refusal.ts';

export interface FieldError {
  path: string;
  message: string;
}

/** An answer that says what is wrong (RFC 9457): what happened in one sentence, for the person who meets it. */
export class Problem extends Error {
  constructor(
    readonly status: number,
    readonly detail: string,
    readonly extra: { code?: string; errors?: FieldError[]; retryAfter?: number } = {},
  ) {
    super(detail);
  }
}

const titles: Record<number, string> = {
  400: 'Not understood',
  401: 'Who are you?',
  403: 'Not this',
  404: 'Not found',
  409: 'Not in this state',
  410: 'Ended',
  412: 'Changed meanwhile',
  413: 'Too large',
  415: 'Not a picture',
  416: 'No such part',
  422: 'Not filled in right',
  428: 'Which version?',
  429: 'Too often',
  500: 'Something broke',
  503: 'Not now',
};

const details: Record<number, string> = {
  401: 'Please sign in first.',
  403: 'You may not do this.',
  404: 'There is nothing here, or it is not for you.',
  412: 'Somebody changed this meanwhile. Reload to see the newer version; what you typed is still here.',
  428: 'The request does not say which version it changes.',
};

/** Makes the error a route throws. Without a sentence it takes the usual one of its status. */
export function problem(status: number, detail?: string, extra?: Problem['extra']): Problem {
  return new Problem(status, detail ?? details[status] ?? titles[status] ?? 'Something broke', extra);
}

/** 422 with every wrong field at once. */
export function invalid(errors: FieldError[]): Problem {
  return new Problem(422, errors.length === 1 ? (errors[0]?.message ?? '') : 'Some fields need another look.', { errors });
}

function fromZod(error: ZodError): Problem {
  return invalid(error.issues.map((issue) => ({ path: issue.path.join('.'), message: issue.message })));
}

/** What PostgreSQL calls an error, also where the models have wrapped it. */
export function sqlState(error: unknown): string | undefined {
  const { code, nativeError } = (error ?? {}) as { code?: unknown; nativeError?: { code?: unknown } };
  const state = nativeError?.code ?? code;
  return typeof state === 'string' ? state : undefined;
}

function asProblem(error: unknown): Problem | undefined {
  if (error instanceof Problem) return error;
  if (error instanceof ZodError) return fromZod(error);
  if (error instanceof Refusal) return problem(415, error.message, { code: error.code });
  if (error instanceof multer.MulterError) return problem(error.code === 'LIMIT_FILE_SIZE' ? 413 : 422, `${error.message}.`);
  const { type, status } = (error ?? {}) as { type?: string; status?: number };
  if (type === 'entity.too.large') return problem(413, 'That is more than this accepts.');
  if (type === 'entity.parse.failed' || type === 'encoding.unsupported' || type === 'charset.unsupported')
    return problem(400, 'The request could not be read.');
  if (typeof status === 'number' && status >= 400 && status < 500) return problem(status);
  // Uniqueness is the last word where two requests race: whoever comes second hears it as a state.
  if (sqlState(error) === '23505') return problem(409, 'That is there already.', { code: 'there-already' });
  // A text column holds every character but NUL (22021; 22P05 within JSON).
  if (['22021', '22P05'].includes(sqlState(error) ?? '')) return problem(422, 'The text holds a character that cannot be kept (NUL).');
  return undefined;
}

/** Answers with the problem; what is not one is logged and answered as 500 without inner details. */
export function problems(log: Logger): ErrorRequestHandler {
  return (error: unknown, req, res, next) => {
    if (res.headersSent) return next(error);
    const known = asProblem(error);
    if (!known) (req.log ?? log).error({ err: error }, 'a request failed');
    const { status, detail, extra } = known ?? problem(500, 'Something broke on our side. It has been noted; please try again.');
    if (extra.retryAfter !== undefined) res.setHeader('Retry-After', String(Math.ceil(extra.retryAfter)));
    res.status(status).type('application/problem+json');
    res.send(
      JSON.stringify({
        type: 'about:blank',
        title: titles[status] ?? 'Problem',
        status,
        detail,
        ...(extra.code ? { code: extra.code } : {}),
        ...(extra.errors ? { errors: extra.errors } : {}),
      }),
    );
  };
}

/** The end of the API's road. */
export const notFound: RequestHandler = () => {
  throw problem(404);
};
