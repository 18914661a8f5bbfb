import type { Request, Response } from 'express';
import type { Look, LookAnswer } from '../../contract/open-links.ts';
import { invitationTo } from '../../middleware/invitations.ts';
import { beginLooking, looksAlready } from '../../middleware/lookers.ts';
import { problem } from '../../middleware/problem.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { findOpenLink, refuseClosedLink } from './find-open-link.ts';
import { checkPassphrase } from './passphrases.ts';

/**
 * Opens an open link: a guest of the sheet lands on it as they are, everybody else begins to look. Safe to repeat.
 * @throws Problem 404 where there is no such link; 410 where it was withdrawn or is over; 422 for a wrong passphrase, 429 after too many of them
 */
export async function look({ ctx, limits, sessions }: RouteContext, req: Request, res: Response, input: Look): Promise<LookAnswer> {
  const link = await findOpenLink(ctx.knex, input.token);
  const answer: LookAnswer = { goTo: `/sheets/${link.sheetId}`, studio: link.studioName };
  const me = await sessions.read(req, res, 'guest');
  if (me && (await invitationTo(link.sheetId, me.accountId))) return answer;
  refuseClosedLink(link);
  if (await looksAlready(req, link)) return answer;
  if (link.passphraseHash) {
    if (!input.passphrase) return { ...answer, goTo: null };
    const key = `${req.ip ?? ''}/${link.id}`;
    await limits.count('passphrase', key);
    await checkPassphrase(link.passphraseHash, input.passphrase);
    // Right ones do not count: a whole office may come from one address.
    await limits.giveBack('passphrase', key);
  }
  if (!(await beginLooking(ctx.knex, res, link, ctx.config.secureCookies)))
    throw problem(409, 'The studio changed this link just now. Please open it again.', { code: 'changed' });
  return answer;
}
