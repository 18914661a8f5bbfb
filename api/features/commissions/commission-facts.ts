/**
 * SQL that counts what decides a commission's state and fills its steps: `cross join lateral (…) facts` on commissions aliased `c`.
 * Every count goes through an index that begins with the commission. Kept in step with domain/commission-state.ts, which a test proves.
 */
const COUNTS = `
  select sheets.*, picks.*, finals.*
  from (
    select count(*) filter (where s.withdrawn_at is null and s.issued_at is null)::int as drafts,
           count(*) filter (where s.withdrawn_at is null and s.issued_at is not null and s.sent_at is null
                              and (s.ends_at is null or s.ends_at > now()))::int as open_sheets,
           count(*) filter (where s.withdrawn_at is not null
                               or (s.issued_at is not null and s.sent_at is null and s.ends_at <= now()))::int as ended_sheets
    from sheets s where s.commission_id = c.id
  ) sheets,
  (
    select coalesce(sum(l.pick_count), 0)::int as picks, coalesce(sum(l.extra_count), 0)::int as extras,
           coalesce(sum(l.with_final), 0)::int as picks_with_final
    from (
      select distinct on (p.sheet_id) p.pick_count, p.extra_count,
             (select count(*) from picks k join finals f on f.commission_id = c.id and f.frame_id = k.frame_id and f.deleted_at is null
               where k.pick_list_id = p.id) as with_final
      from pick_lists p where p.commission_id = c.id order by p.sheet_id, p.number desc
    ) l
  ) picks,
  (
    select count(*)::int as finals,
           count(*) filter (where exists (
             select from final_versions v join delivery_files df on df.final_version_id = v.id
               join deliveries d on d.id = df.delivery_id and d.sent_at is not null and d.withdrawn_at is null
             where v.final_id = f.id))::int as finals_delivered
    from finals f where f.commission_id = c.id and f.deleted_at is null
  ) finals`;

const STATE = `
  case when c.closed_at is not null then 'Closed'
       when counts.open_sheets > 0 then 'With client'
       when counts.picks > 0 and counts.finals = 0 then 'Picks in'
       when counts.picks > counts.picks_with_final then 'Finishing'
       when counts.finals > 0 then case when counts.finals_delivered >= counts.finals then 'Delivered' else 'Ready' end
       when counts.ended_sheets > 0 then 'With client'
       else 'Preparing' end`;

/** The lateral part of a question about commissions `c`: gives `facts` with the counts and the state. */
export const COMMISSION_FACTS = `cross join lateral (select counts.*, ${STATE} as state from (${COUNTS}) counts) facts`;

/** What a question with COMMISSION_FACTS gives of a commission's facts. */
export interface CommissionFactsRow {
  drafts: number;
  openSheets: number;
  endedSheets: number;
  picks: number;
  extras: number;
  picksWithFinal: number;
  finals: number;
  finalsDelivered: number;
}
