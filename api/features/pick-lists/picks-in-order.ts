import type { Knex } from 'knex';
import { Bracket } from '../../models/Bracket.ts';
import { framesOfBrackets } from '../brackets/bracket-frames.ts';

/** A proof with at least one lead's mark, and everybody who marked it, leads first. */
export interface MarkedProof {
  proofId: string;
  proofNumber: number;
  frameId: string;
  frameName: string;
  /** All frames of a bracket, darkest first; empty for a single frame. */
  frameIds: string[];
  viewId: string | null;
  viewTitle: string | null;
  markedBy: { name: string; role: 'lead' | 'reviewer' }[];
}

/** The picks of a sheet as they stand, in the order of the sheet. */
export async function picksInOrder(trx: Knex, sheetId: string): Promise<MarkedProof[]> {
  const { rows } = await trx.raw<{ rows: (MarkedProof & ProofOfBracket)[] }>(
    `select p.id as proof_id, p.bracket_id, p.studio_id, p.number as proof_number, f.id as frame_id, f.name as frame_name, v.id as view_id, v.title as view_title,
            json_agg(json_build_object('name', g.name, 'role', g.role) order by g.role, m.marked_at, g.id) as marked_by
       from proofs p
       join frames f on f.id = p.frame_id
       left join views v on v.id = p.view_id
       join marks m on m.proof_id = p.id
       join sheet_guests g on g.sheet_id = p.sheet_id and g.account_id = m.account_id and g.withdrawn_at is null
      where p.sheet_id = ?
      group by p.id, f.id, v.id
     having bool_or(g.role = 'lead')
      order by v.position nulls last, p.position, p.id`,
    [sheetId],
  );
  return withBrackets(trx, rows);
}

interface ProofOfBracket {
  studioId: string;
  bracketId: string | null;
}

/** A pick of a bracket brings all its frames. */
async function withBrackets(trx: Knex, proofs: (MarkedProof & ProofOfBracket)[]): Promise<MarkedProof[]> {
  const [first] = proofs;
  if (!first) return [];
  const brackets = await Bracket.within(first, trx).findByIds(proofs.flatMap(({ bracketId }) => bracketId ?? []));
  const frames = await framesOfBrackets(first, brackets, trx);
  return proofs.map(({ bracketId, studioId: _, ...proof }) => ({
    ...proof,
    frameIds: (frames.get(bracketId ?? '')?.frames ?? []).map(({ id }) => id),
  }));
}
