import type { Context } from '../../context.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import type { GuestActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { announceMarks } from './announce-marks.ts';

/**
 * Who may mark what, asked in the same statement that marks: an invitation not taken back, a sheet that is open, a proof that lies on it.
 * The share lock makes a mark wait for a list that is being sent, and then find the sheet closed.
 */
const ALLOWED = `
  select p.id as proof_id, s.studio_id
    from sheets s
    join sheet_guests g on g.sheet_id = s.id and g.account_id = :accountId and g.withdrawn_at is null
    join proofs p on p.sheet_id = s.id and p.id = :proofId
   where s.id = :sheetId and s.issued_at is not null and s.withdrawn_at is null and s.sent_at is null
     and (s.ends_at is null or s.ends_at > now())
     for share of s`;

const MARK = `
  with allowed as (${ALLOWED}),
       placed as (insert into marks (sheet_id, proof_id, account_id, studio_id)
                  select :sheetId, proof_id, :accountId, studio_id from allowed on conflict do nothing)
  select count(*)::int as allowed from allowed`;

const UNMARK = `
  with allowed as (${ALLOWED}),
       taken as (delete from marks using allowed
                  where marks.sheet_id = :sheetId and marks.proof_id = allowed.proof_id and marks.account_id = :accountId)
  select count(*)::int as allowed from allowed`;

/**
 * Sets or takes away one guest's own mark; nobody's mark touches anybody else's. Doing it twice is the same as once.
 * @throws Problem 404 for whoever is not invited, 409 on a sheet that was sent or has ended.
 */
export async function setMark(ctx: Context, actor: GuestActor, sheetId: string, proofId: string, marked: boolean): Promise<void> {
  const { rows } = await ctx.knex.raw<{ rows: { allowed: number }[] }>(marked ? MARK : UNMARK, {
    accountId: actor.accountId,
    proofId,
    sheetId,
  });
  if (rows[0]?.allowed === 1) return announceMarks(ctx, sheetId);
  throw await refusal(actor, sheetId, proofId);
}

async function refusal(actor: GuestActor, sheetId: string, proofId: string): Promise<Error> {
  const invitation = await SheetGuest.query().findOne({ sheetId, accountId: actor.accountId }).whereNull('withdrawnAt');
  const sheet = invitation && (await Sheet.query().findById(sheetId).whereNotNull('issuedAt').whereNull('withdrawnAt'));
  if (!sheet) return problem(404);
  const state = sheetState(sheet, new Date());
  if (state === 'Sent') return problem(409, 'The picks were sent already; nothing can be changed any more.', { code: 'sent' });
  if (state === 'Ended') return problem(409, 'The last date has passed; nothing can be changed any more.', { code: 'ended' });
  return problem(404, `Proof ${proofId} is no longer on this sheet.`);
}
