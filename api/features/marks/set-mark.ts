import DataLoader from 'dataloader';
import type { Context } from '../../context.ts';
import { sheetState } from '../../domain/sheet-state.ts';
import type { GuestActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Sheet } from '../../models/Sheet.ts';
import { SheetGuest } from '../../models/SheetGuest.ts';
import { announceMarks } from './announce-marks.ts';

interface Wish {
  ctx: Context;
  sheetId: string;
  proofId: string;
  accountId: string;
  marked: boolean;
}
type Pair = Pick<Wish, 'proofId' | 'accountId'>;

/**
 * Who may mark what, asked in the same statement that marks: an invitation not taken back, a sheet that is open and whose commission is there,
 * a proof that lies on it.
 * The share lock makes a mark wait for a list that is being sent, and then find the sheet closed.
 */
const ALLOWED = `
  select p.id as proof_id, g.account_id, s.studio_id
    from sheets s
    join commissions c on c.id = s.commission_id and c.deleted_at is null
    join unnest(:proofIds::uuid[], :accountIds::uuid[]) as wish (proof_id, account_id) on true
    join sheet_guests g on g.sheet_id = s.id and g.account_id = wish.account_id and g.withdrawn_at is null
    join proofs p on p.sheet_id = s.id and p.id = wish.proof_id
   where s.id = :sheetId and s.issued_at is not null and s.withdrawn_at is null and s.sent_at is null
     and (s.ends_at is null or s.ends_at > now())
     for share of s`;

// In one order always: two statements with marks in common wait for each other, never in a circle.
const MARK = `
  with allowed as (${ALLOWED}),
       placed as (insert into marks (sheet_id, proof_id, account_id, studio_id)
                  select :sheetId, proof_id, account_id, studio_id from allowed order by proof_id, account_id on conflict do nothing)
  select proof_id, account_id from allowed`;

const UNMARK = `
  with allowed as (${ALLOWED}),
       found as (select marks.sheet_id, proof_id, account_id from marks join allowed using (proof_id, account_id)
                  where marks.sheet_id = :sheetId order by proof_id, account_id for update of marks),
       taken as (delete from marks using found
                  where (marks.sheet_id, marks.proof_id, marks.account_id) = (found.sheet_id, found.proof_id, found.account_id))
  select proof_id, account_id from allowed`;

const pairOf = ({ proofId, accountId }: Pair) => `${proofId}/${accountId}`;
const groupOf = ({ sheetId, marked }: Wish) => `${sheetId}/${marked}`;

/** Carries out wishes of one sheet and one kind; gives the pairs that were allowed. */
async function carryOut(group: readonly Wish[]): Promise<Set<string>> {
  const [{ ctx, sheetId, marked }] = group as [Wish];
  const { rows } = await ctx.knex.raw<{ rows: Pair[] }>(marked ? MARK : UNMARK, {
    sheetId,
    proofIds: group.map((wish) => wish.proofId),
    accountIds: group.map((wish) => wish.accountId),
  });
  return new Set(rows.map(pairOf));
}

/** Whether each wish was allowed; where a statement failed, the error stands in the place of its wishes alone. */
async function carryOutAll(wishes: readonly Wish[]): Promise<(boolean | Error)[]> {
  const groups = new Map<string, Wish[]>();
  for (const wish of wishes) groups.set(groupOf(wish), [...(groups.get(groupOf(wish)) ?? []), wish]);
  const answers = new Map([...groups].map(([key, group]) => [key, carryOut(group).catch((error: unknown) => error as Error)]));
  return Promise.all(
    wishes.map(async (wish) => {
      const allowed = await answers.get(groupOf(wish));
      return allowed instanceof Error ? allowed : allowed?.has(pairOf(wish)) === true;
    }),
  );
}

/**
 * Marks that arrive in the same turn of the event loop are one statement a sheet: at the end of a meeting twenty people mark at once,
 * and each statement costs a journey and a commit.
 */
const gathered = new DataLoader<Wish, boolean>(carryOutAll, {
  cache: false,
  maxBatchSize: 200,
  batchScheduleFn: (carry) => setImmediate(carry),
});

/**
 * Sets or takes away one guest's own mark; nobody's mark touches anybody else's. Doing it twice is the same as once.
 * @throws Problem 404 for whoever is not invited, 409 on a sheet that was sent or has ended.
 */
export async function setMark(ctx: Context, actor: GuestActor, sheetId: string, proofId: string, marked: boolean): Promise<void> {
  if (await gathered.load({ ctx, sheetId, proofId, accountId: actor.accountId, marked })) return announceMarks(ctx, sheetId);
  throw await refusal(actor, sheetId, proofId);
}

async function refusal(actor: GuestActor, sheetId: string, proofId: string): Promise<Error> {
  const invitation = await SheetGuest.query().findOne({ sheetId, accountId: actor.accountId }).whereNull('withdrawnAt');
  const sheet =
    invitation &&
    (await Sheet.query()
      .findById(sheetId)
      .whereNotNull('issuedAt')
      .whereNull('withdrawnAt')
      .whereExists(Sheet.relatedQuery('commission').whereNull('deletedAt')));
  if (!sheet) return problem(404);
  const state = sheetState(sheet, new Date());
  if (state === 'Sent') return problem(409, 'The picks were sent already; nothing can be changed any more.', { code: 'sent' });
  if (state === 'Ended') return problem(409, 'The last date has passed; nothing can be changed any more.', { code: 'ended' });
  return problem(404, `Proof ${proofId} is no longer on this sheet.`);
}
