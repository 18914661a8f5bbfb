import type { Context } from '../../context.ts';
import type { ListMine, MinePage, MineRow } from '../../contract/guests.ts';
import { momentKeyOf, momentText } from '../../db/moment-key.ts';
import { pageOf } from '../../db/page.ts';
import { sheetIsOver, sheetState } from '../../domain/sheet-state.ts';
import type { GuestActor } from '../../middleware/actor.ts';

interface Row {
  kind: 'sheet' | 'delivery';
  id: string;
  title: string;
  number: number;
  studio: string;
  timeZone: string;
  role: 'lead' | 'reviewer' | null;
  invitedAt: Date;
  moment: string;
  issuedAt: Date;
  sentAt: Date | null;
  endsAt: Date | null;
  withdrawn: boolean;
  fetched: boolean;
}

const EVERY_INVITATION = `
  select 'sheet' as kind, s.id, c.title, s.number, st.name as studio, st.time_zone, g.role, g.invited_at, s.issued_at, s.sent_at, s.ends_at,
         (g.withdrawn_at is not null or s.withdrawn_at is not null or c.deleted_at is not null) as withdrawn, false as fetched
    from sheet_guests g
    join sheets s on s.id = g.sheet_id join studios st on st.id = g.studio_id join commissions c on c.id = s.commission_id
   where g.account_id = :account and s.issued_at is not null
  union all
  select 'delivery', d.id, c.title, d.number, st.name, st.time_zone, null, coalesce(r.invited_at, d.sent_at), d.sent_at, d.sent_at, d.ends_at,
         (r.withdrawn_at is not null or d.withdrawn_at is not null or c.deleted_at is not null),
         exists (select from downloads w where w.delivery_id = d.id and w.account_id = r.account_id and w.finished_at is not null)
    from delivery_recipients r
    join deliveries d on d.id = r.delivery_id join studios st on st.id = r.studio_id join commissions c on c.id = d.commission_id
   where r.account_id = :account and d.sent_at is not null`;

/** Every sheet and delivery a guest was ever invited to by any studio, newest first. */
export async function listMine(ctx: Context, actor: GuestActor, { after, limit }: ListMine): Promise<MinePage> {
  const key = momentKeyOf(after);
  const { rows } = await ctx.knex.raw<{ rows: Row[] }>(
    `select mine.*, ${momentText('invited_at')} as moment from (${EVERY_INVITATION}) mine
      ${key ? 'where (invited_at, id) < (cast(:moment as timestamptz), cast(:id as uuid))' : ''}
      order by invited_at desc, id desc limit :limit`,
    { account: actor.accountId, limit: limit + 1, ...key },
  );
  const page = pageOf(rows, limit, (row) => [row.moment, row.id]);
  const now = new Date();
  return { items: page.items.map((row) => present(row, now)), next: page.next };
}

function stateOf(row: Row, now: Date): MineRow['state'] {
  if (row.withdrawn) return 'Withdrawn';
  if (row.kind === 'delivery') return row.endsAt && row.endsAt <= now ? 'Ended' : row.fetched ? 'Fetched' : 'Ready';
  const state = sheetState(row, now);
  return state === 'Draft' ? 'Open' : state;
}

/** A sheet can be looked at for a while after its end, a delivery cannot. */
function canOpen(row: Row, now: Date): boolean {
  if (row.withdrawn) return false;
  return row.kind === 'sheet' ? !sheetIsOver(row, now) : row.endsAt === null || row.endsAt > now;
}

function present(row: Row, now: Date): MineRow {
  const address = row.kind === 'sheet' ? `/sheets/${row.id}` : `/deliveries/${row.id}`;
  return {
    kind: row.kind,
    id: row.id,
    title: row.title,
    number: row.number,
    studio: row.studio,
    state: stateOf(row, now),
    role: row.role,
    invitedAt: row.invitedAt.toISOString(),
    endsAt: row.endsAt?.toISOString() ?? null,
    timeZone: row.timeZone,
    goTo: canOpen(row, now) ? address : null,
  };
}
