import type { Knex } from 'knex';
import { problem } from '../../middleware/problem.ts';
import { hashToken } from '../guests/tokens.ts';

/** An open link with what is said about it to whoever opens it. */
export interface FoundOpenLink {
  id: string;
  sheetId: string;
  studioId: string;
  studioName: string;
  replyTo: string;
  commissionId: string;
  /** Of the commission. */
  title: string;
  /** Of the sheet. */
  number: number;
  passphraseHash: string | null;
  round: number;
  /** The link, or the whole sheet, was taken back, or the commission deleted. */
  withdrawn: boolean;
  /** Its own last day or the sheet's has passed. */
  ended: boolean;
}

const FIND = `
  select o.id, o.sheet_id, o.studio_id, st.name as studio_name, st.reply_to, s.commission_id, c.title, s.number, o.passphrase_hash, o.round,
         (o.withdrawn_at is not null or s.withdrawn_at is not null or c.deleted_at is not null) as withdrawn,
         coalesce(least(o.ends_at, s.ends_at) <= now(), false) as ended
    from open_links o
    join sheets s on s.id = o.sheet_id join commissions c on c.id = s.commission_id join studios st on st.id = o.studio_id`;

/** The open link of a token. @throws Problem 404 where there is none */
export async function findOpenLink(db: Knex, token: string): Promise<FoundOpenLink> {
  const { rows } = await db.raw<{ rows: FoundOpenLink[] }>(`${FIND} where o.token_hash = ?`, [hashToken(token)]);
  if (!rows[0]) throw problem(404, 'There is no such link. It may have been cut short: copy all of it.');
  return rows[0];
}

/** The same by its id. @throws Problem 404 */
export async function openLinkById(db: Knex, id: string): Promise<FoundOpenLink> {
  const { rows } = await db.raw<{ rows: FoundOpenLink[] }>(`${FIND} where o.id = ?`, [id]);
  if (!rows[0]) throw problem(404);
  return rows[0];
}

/** @throws Problem 410 with the code "withdrawn" or "ended" where nothing is opened by the link any more */
export function refuseClosedLink({ withdrawn, ended, studioName, replyTo }: FoundOpenLink): void {
  const ask = `Write to ${studioName} at ${replyTo} if you still need it.`;
  if (withdrawn) throw problem(410, `${studioName} has withdrawn this link. ${ask}`, { code: 'withdrawn' });
  if (ended) throw problem(410, `The time of this link is over. ${ask}`, { code: 'ended' });
}
