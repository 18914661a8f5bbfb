import type { Knex } from 'knex';
import type { CommissionState } from '../../domain/commission-state.ts';
import type { StudioScope } from '../../db/scope.ts';
import { COMMISSION_FACTS, type CommissionFactsRow } from '../commissions/commission-facts.ts';

/** Everything the desk knows of a commission. Moments that have not come are null. */
export interface DeskFacts extends CommissionFactsRow {
  id: string;
  title: string;
  clientName: string;
  state: CommissionState;
  /** "2026-12-24" */
  shotOn: string | null;
  dueOn: string | null;
  hasBrief: boolean;
  createdAt: Date;
  views: number;
  frames: number;
  framesReading: number;
  framesFailed: number;
  lastFrameAt: Date | null;
  /** The draft made last. */
  draftNumber: number | null;
  draftProofs: number | null;
  draftAt: Date | null;
  /** Of the open sheets, the one that ends first. */
  openSheetId: string | null;
  openNumber: number | null;
  openAllowance: number | null;
  openSince: Date | null;
  openEndsAt: Date | null;
  guests: number | null;
  guestsOpened: number | null;
  /** Proofs marked by a lead. */
  marked: number | null;
  /** People with a mark. */
  markers: number | null;
  /** Invitations whose mail did not arrive. */
  mailsFailed: number;
  endedNumber: number | null;
  endedAt: Date | null;
  listNumber: number | null;
  listAt: Date | null;
  listPicks: number | null;
  listExtras: number | null;
  finalsToMatch: number;
  lastFinalAt: Date | null;
  /** The delivery made last that was not withdrawn. */
  deliveryNumber: number | null;
  deliverySentAt: Date | null;
  deliveryMadeAt: Date | null;
  deliveryEndsAt: Date | null;
  deliveryFiles: number | null;
  deliveryFetched: number | null;
  archivesFailed: number | null;
  pictureId: string | null;
  pictureRecipe: number | null;
  pictureWidth: number | null;
  pictureHeight: number | null;
  picturePlaceholder: string | null;
}

const FRAMES = `cross join lateral (
  select count(*)::int as frames, count(*) filter (where f.state = 'reading')::int as frames_reading,
         count(*) filter (where f.state = 'failed')::int as frames_failed, max(f.created_at) as last_frame_at
  from frames f where f.commission_id = c.id and f.deleted_at is null) frames`;

const DRAFT = `left join lateral (
  select s.number as draft_number, s.created_at as draft_at,
         (select count(*)::int from proofs p where p.sheet_id = s.id) as draft_proofs
  from sheets s where s.commission_id = c.id and s.issued_at is null and s.withdrawn_at is null order by s.number desc limit 1) draft on true`;

const OPEN = `left join lateral (
  select s.id as open_sheet_id, s.number as open_number, s.allowance as open_allowance, s.issued_at as open_since, s.ends_at as open_ends_at,
         g.guests, g.guests_opened, m.marked, m.markers
  from sheets s
  cross join lateral (select count(*)::int as guests, count(g.first_opened_at)::int as guests_opened
    from sheet_guests g where g.sheet_id = s.id and g.withdrawn_at is null) g
  cross join lateral (select count(distinct m.proof_id) filter (where g.role = 'lead')::int as marked, count(distinct m.account_id)::int as markers
    from marks m join sheet_guests g on g.sheet_id = m.sheet_id and g.account_id = m.account_id and g.withdrawn_at is null
    where m.sheet_id = s.id) m
  where s.commission_id = c.id and s.withdrawn_at is null and s.issued_at is not null and s.sent_at is null
    and (s.ends_at is null or s.ends_at > now())
  order by s.ends_at, s.number limit 1) open_sheet on true`;

const ENDED = `left join lateral (
  select s.number as ended_number, coalesce(s.withdrawn_at, s.ends_at) as ended_at
  from sheets s where s.commission_id = c.id and s.sent_at is null and s.issued_at is not null
    and (s.withdrawn_at is not null or s.ends_at <= now()) order by s.number desc limit 1) ended on true`;

const LIST = `left join lateral (
  select l.number as list_number, l.sent_at as list_at, l.pick_count as list_picks, l.extra_count as list_extras
  from pick_lists l where l.commission_id = c.id order by l.sent_at desc limit 1) list on true`;

const FINALS = `cross join lateral (
  select count(*) filter (where f.match = 'ask')::int as finals_to_match, max(v.created_at) as last_final_at
  from finals f left join final_versions v on v.final_id = f.id and v.number = 1
  where f.commission_id = c.id and f.deleted_at is null) finals`;

/** A file is fetched when somebody has it whole, alone or within an archive. */
const DELIVERY = `left join lateral (
  select d.number as delivery_number, d.sent_at as delivery_sent_at, d.created_at as delivery_made_at, d.ends_at as delivery_ends_at,
         (select count(*)::int from archives a where a.delivery_id = d.id and a.state = 'failed') as archives_failed,
         files.delivery_files,
         case when exists (select from downloads w where w.delivery_id = d.id and w.what in ('full', 'web') and w.finished_at is not null)
              then files.delivery_files
              else (select count(distinct w.delivery_file_id)::int from downloads w where w.delivery_id = d.id and w.finished_at is not null)
         end as delivery_fetched
  from deliveries d
  cross join lateral (select count(*)::int as delivery_files from delivery_files df where df.delivery_id = d.id) files
  where d.commission_id = c.id and d.withdrawn_at is null order by d.number desc limit 1) delivery on true`;

const PICTURE = `left join lateral (
  select f.id as picture_id, f.recipe as picture_recipe, f.width as picture_width, f.height as picture_height, f.placeholder as picture_placeholder
  from frames f where f.state = 'ready' and f.deleted_at is null and f.id = coalesce(
    (select p.frame_id from sheets s join proofs p on p.sheet_id = s.id
      where s.commission_id = c.id and s.withdrawn_at is null order by s.number, p.position, p.id limit 1),
    (select g.id from frames g where g.commission_id = c.id and g.deleted_at is null and g.hidden_at is null and g.state = 'ready'
      order by g.taken_local, g.name, g.id limit 1))) picture on true`;

const QUESTION = `
  select c.id, c.title, c.shot_on, c.due_on, c.brief <> '' as has_brief, c.created_at, cl.name as client_name,
    (select count(*)::int from views v where v.commission_id = c.id) as views,
    (select count(*)::int from mails m where m.commission_id = c.id and m.kind like 'sheet-%' and m.state in ('failed', 'unsure')
      and not exists (select from mails n where n.commission_id = c.id and n.to_address = m.to_address and n.created_at > m.created_at)) as mails_failed,
    facts.*, frames.*, draft.*, open_sheet.*, ended.*, list.*, finals.finals_to_match, finals.last_final_at, delivery.*, picture.*
  from commissions c join clients cl on cl.id = c.client_id
  ${COMMISSION_FACTS} ${FRAMES} ${DRAFT} ${OPEN} ${ENDED} ${LIST} ${FINALS} ${DELIVERY} ${PICTURE}
  where c.studio_id = ? and c.deleted_at is null and c.closed_at is null
  order by c.created_at desc limit 2000`;

/** What the desk knows of every commission that is neither closed nor deleted, by one question. */
export async function readDeskFacts(db: Knex, scope: StudioScope): Promise<DeskFacts[]> {
  const { rows } = await db.raw<{ rows: DeskFacts[] }>(QUESTION, [scope.studioId]);
  return rows;
}

/** How many sheets and deliveries shut their links within the next seven days. */
export async function countLinksEnding(db: Knex, scope: StudioScope): Promise<number> {
  const { rows } = await db.raw<{ rows: { links: number }[] }>(
    `select (
       (select count(*) from sheets s join commissions c on c.id = s.commission_id and c.deleted_at is null
         where s.studio_id = :studioId and s.withdrawn_at is null and s.issued_at is not null and s.sent_at is null
           and s.ends_at between now() and now() + interval '7 days')
       + (select count(*) from deliveries d join commissions c on c.id = d.commission_id and c.deleted_at is null
         where d.studio_id = :studioId and d.withdrawn_at is null and d.sent_at is not null
           and d.ends_at between now() and now() + interval '7 days'))::int as links`,
    { studioId: scope.studioId },
  );
  return rows[0]?.links ?? 0;
}
