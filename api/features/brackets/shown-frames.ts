import type { Knex } from 'knex';

/** What a client has seen of a frame, alone or within its bracket. */
export interface Shown {
  /** Number of the last proof sheet with it that is, or was, with a client. */
  sheetNumber: number | null;
  /** One of those sheets was sent, taken back or has ended. */
  closed: boolean;
  picked: boolean;
}

const SHOWN = `
  select id, max(sheet_number) as sheet_number, bool_or(closed) as closed, bool_or(picked) as picked from (
    select f.id, s.number as sheet_number, false as picked,
           s.withdrawn_at is not null or s.sent_at is not null or coalesce(s.ends_at <= now(), false) as closed
      from sheets s
      join proofs p on p.sheet_id = s.id
      join frames f on f.id = p.frame_id or f.bracket_id = p.bracket_id
     where s.studio_id = :studioId and s.commission_id = :commissionId and s.issued_at is not null
    union all
    select unnest(k.frame_ids || k.frame_id), null, true, true
      from pick_lists l join picks k on k.pick_list_id = l.id
     where l.studio_id = :studioId and l.commission_id = :commissionId) shown
  group by id`;

/** The frames of a commission that a client has been shown or has picked, by id. */
export async function shownFrames(
  db: Knex,
  { studioId, commissionId }: { studioId: string; commissionId: string },
): Promise<Map<string, Shown>> {
  const { rows } = await db.raw<{ rows: (Shown & { id: string })[] }>(SHOWN, { studioId, commissionId });
  return new Map(rows.map(({ id, sheetNumber, closed, picked }) => [id, { sheetNumber, closed, picked }]));
}
