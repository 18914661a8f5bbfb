import { pipeline } from 'node:stream/promises';
import { Router } from 'express';
import type { Context } from '../../context.ts';
import { problem } from '../../middleware/problem.ts';
import { sealHolds } from '../../services/picture-address.ts';

const ID = '[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}';
/** Keys of pictures made by us. Originals, web sizes and archives are downloads and never have such an address. */
const PICTURE = new RegExp(
  `^studios/${ID}/(commissions/${ID}/pictures/(frames|brackets|sheets|finals)/[0-9a-z/-]+\\.jpg|watermarks/[0-9a-f]{64}\\.png)$`,
);

function isGone(error: unknown): boolean {
  return ['NoSuchKey', 'NotFound'].includes((error as { name?: string }).name ?? '');
}

/**
 * Serves pictures by their signed addresses. The address is the permission: it was given to somebody who may see the picture,
 * and ends by itself.
 */
export function pictureRoutes(ctx: Context): Router {
  const router = Router();
  router.get('/pictures/*key', async (req, res) => {
    const key = ([] as string[]).concat(req.params.key ?? []).join('/');
    const until = Number(req.query.until);
    const sealed = typeof req.query.seal === 'string' && sealHolds(ctx.config.secret, key, until, req.query.seal);
    if (!sealed || !PICTURE.test(key))
      throw problem(403, 'This address has ended or was never given out. Reload the page.', { code: 'seal' });
    const picture = await ctx.store.get(key).catch((error: unknown) => {
      throw isGone(error) ? problem(404, 'This picture is not there any more.') : error;
    });
    const seconds = Math.max(0, Math.floor(until - Date.now() / 1000));
    res.set({
      'Content-Type': key.endsWith('.png') ? 'image/png' : 'image/jpeg',
      'Cache-Control': `private, max-age=${seconds}, immutable`,
      'X-Content-Type-Options': 'nosniff',
      'Cross-Origin-Resource-Policy': 'same-origin',
      'Content-Disposition': 'inline',
    });
    // A browser that scrolls on breaks off; that is no error of ours.
    await pipeline(picture, res).catch((error: unknown) => ctx.log.debug({ err: error }, 'a picture was not sent to its end'));
  });
  return router;
}
