import { z, type ZodType } from 'zod';
import { problem } from './problem.ts';
import type { Station } from './station.ts';

declare module 'express-serve-static-core' {
  interface Request {
    /** The version of the row that the client saw, from If-Match. */
    version?: number;
  }
}

/** Checks the body against the contract and puts the checked value in its place. */
export function body(schema: ZodType): Station {
  return (req, _res, next) => {
    req.body = schema.parse(req.body ?? {});
    next();
  };
}

/** Checks the query against the contract; the checked value is in `res.locals.query`. */
export function query(schema: ZodType): Station {
  return (req, res, next) => {
    res.locals.query = schema.parse(req.query);
    next();
  };
}

const Id = z.uuid();

/** What is no id names nothing: 404 before the database is asked. One in capitals is the same id, and compared as the database writes it. */
export function ids(...names: string[]): Station {
  return (req, _res, next) => {
    if (!names.every((name) => Id.safeParse(req.params[name]).success)) throw problem(404);
    for (const name of names) req.params[name] = String(req.params[name]).toLowerCase();
    next();
  };
}

/** Needs `If-Match: "7"`, the version of the row as the client saw it. */
export function ifMatch(): Station {
  return (req, _res, next) => {
    const version = /^(?:W\/)?"(\d{1,9})"$/.exec(req.header('if-match') ?? '')?.[1];
    if (!version) throw problem(428);
    req.version = Number(version);
    next();
  };
}
