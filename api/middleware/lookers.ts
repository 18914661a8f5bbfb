import { createHash, randomBytes } from 'node:crypto';
import type { CookieOptions, Request, Response } from 'express';
import type { Knex } from 'knex';
import { OpenLink } from '../models/OpenLink.ts';
import { problem } from './problem.ts';

/** Somebody who looks at one sheet by its open link, without an account. */
export interface Looker {
  /** Of the looking, not of a person. */
  id: string;
  openLinkId: string;
  sheetId: string;
}

interface FoundLooker extends Looker {
  withdrawn: boolean;
  ended: boolean;
  /** The passphrase was changed since. */
  outdated: boolean;
}

const DAYS = 14;

/** A cookie a sheet, so that a browser can look at several, each by a secret of its own. */
const cookieName = (sheetId: string) => `oriel_look_${sheetId.replaceAll('-', '')}`;
const hash = (token: string) => createHash('sha256').update(token).digest('hex');

function tokenIn(req: Request, sheetId: string): string | undefined {
  const name = `${cookieName(sheetId)}=`;
  const pair = (req.headers.cookie ?? '').split(/; */).find((each) => each.startsWith(name));
  const token = pair?.slice(name.length);
  return token && /^[\w-]{20,64}$/.test(token) ? token : undefined;
}

/** Whether a request comes from a browser that looks, or has looked, at the sheet in its address by an open link. */
export function carriesLooking(req: Request): boolean {
  return tokenIn(req, String(req.params.sheetId ?? '')) !== undefined;
}

const FIND = `
  select k.id, o.id as open_link_id, o.sheet_id, k.round <> o.round as outdated,
         (o.withdrawn_at is not null or s.withdrawn_at is not null or c.deleted_at is not null) as withdrawn,
         coalesce(least(o.ends_at, s.ends_at) <= now(), false) as ended
    from lookers k
    join open_links o on o.id = k.open_link_id join sheets s on s.id = o.sheet_id join commissions c on c.id = s.commission_id
   where k.token_hash = :hash and s.id = :sheetId and k.expires_at > now()`;

/**
 * Who looks at this sheet by its open link; asked anew with every request, so that a withdrawn link shows nothing more.
 * @param sheetId a uuid
 * @throws Problem 410 once the link or the sheet was withdrawn or is over; 401 where the passphrase was changed since; both with the code "look"
 */
export async function readLooker(req: Request, sheetId: string): Promise<Looker | undefined> {
  const found = await findLooker(req, sheetId);
  if (!found) return undefined;
  if (found.withdrawn) throw problem(410, 'The studio has withdrawn this link. Please write to whoever sent it to you.', { code: 'look' });
  if (found.ended) throw problem(410, 'The time of this link is over. Please write to whoever sent it to you.', { code: 'look' });
  if (found.outdated)
    throw problem(401, 'The passphrase of this link was changed. Open the link again and give the new one.', { code: 'look' });
  return { id: found.id, openLinkId: found.openLinkId, sheetId: found.sheetId };
}

async function findLooker(req: Request, sheetId: string): Promise<FoundLooker | undefined> {
  const token = tokenIn(req, sheetId);
  if (!token) return undefined;
  const { rows } = await OpenLink.knex().raw<{ rows: FoundLooker[] }>(FIND, { hash: hash(token), sheetId });
  return rows[0];
}

/** Whether this browser already looks by the link as it now is: opening it again then asks for nothing. */
export async function looksAlready(req: Request, { id, sheetId }: Pick<OpenLink, 'id' | 'sheetId'>): Promise<boolean> {
  const found = await findLooker(req, sheetId);
  return found?.openLinkId === id && !found.withdrawn && !found.ended && !found.outdated;
}

/**
 * Lets this browser look by a link: a random token of 160 bits in a cookie, its SHA-256 in the table. Changes nothing and gives false where the
 * link was withdrawn, or its passphrase changed, after `round` was read: the lock makes it wait for such a change.
 */
export async function beginLooking(
  knex: Knex,
  res: Response,
  link: Pick<OpenLink, 'id' | 'sheetId' | 'round'>,
  secure: boolean,
): Promise<boolean> {
  const token = randomBytes(20).toString('base64url');
  const { rows } = await knex.raw<{ rows: unknown[] }>(
    `with link as (select id, studio_id, round from open_links where id = :id and round = :round and withdrawn_at is null for share)
     insert into lookers (studio_id, open_link_id, token_hash, round, expires_at)
     select studio_id, id, :hash, round, now() + make_interval(days => ${DAYS}) from link returning id`,
    { id: link.id, round: link.round, hash: hash(token) },
  );
  if (rows.length === 0) return false;
  const cookie: CookieOptions = { httpOnly: true, sameSite: 'lax', secure, path: '/api', maxAge: DAYS * 24 * 60 * 60 * 1000 };
  res.cookie(cookieName(link.sheetId), token, cookie);
  return true;
}

/** Ends the looking of this browser: its guest has a place on the sheet now. */
export async function endLooking(req: Request, res: Response, sheetId: string): Promise<void> {
  const token = tokenIn(req, sheetId);
  if (!token) return;
  await OpenLink.knex()('lookers')
    .where({ tokenHash: hash(token) })
    .delete();
  res.clearCookie(cookieName(sheetId), { path: '/api' });
}
