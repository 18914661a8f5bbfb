import type { RequestHandler } from 'express';
import type { Config } from '../config.ts';
import { problem } from './problem.ts';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses state-changing requests that a page of another origin made: browsers say so themselves in Sec-Fetch-Site or Origin.
 * Programs send neither and carry no cookie of somebody else, so they pass.
 */
export function sameOrigin(config: Config): RequestHandler {
  const ours = new URL(config.address).origin;
  return (req, _res, next) => {
    if (SAFE.has(req.method)) return next();
    const origin = req.header('origin');
    const site = req.header('sec-fetch-site');
    const foreign = origin !== undefined && origin !== ours && origin !== `${req.protocol}://${req.header('host') ?? ''}`;
    if (foreign || site === 'cross-site' || (site === 'same-site' && origin === undefined)) {
      throw problem(403, 'This request came from another website and was not carried out.', { code: 'other-origin' });
    }
    next();
  };
}
