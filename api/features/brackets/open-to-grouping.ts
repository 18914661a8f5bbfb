import type { Knex } from 'knex';
import { Bracket } from '../../models/Bracket.ts';
import type { Commission } from '../../models/Commission.ts';
import { Frame } from '../../models/Frame.ts';
import { shownFrames } from './shown-frames.ts';

/** What of a commission stands open to the machine. */
export interface OpenToGrouping {
  /** Measured frames that neither a person nor a client's eyes have settled, by id. */
  frames: Frame[];
  /** Brackets that nobody made by hand and that have a frame among those. */
  brackets: Bracket[];
}

/** Reads what the machine may group. @param hold within a transaction: nobody else changes the frames until its end */
export async function openToGrouping(db: Knex, commission: Commission, { hold = false } = {}): Promise<OpenToGrouping> {
  const { id: commissionId, studioId } = commission;
  const query = Frame.within(commission, db)
    .where({ commissionId, state: 'ready', groupedByHand: false })
    .whereNull('deletedAt')
    .whereNotNull('measuresRecipe')
    .orderBy('id');
  const measured = await (hold ? query.forUpdate() : query);
  const shown = await shownFrames(db, { studioId, commissionId });
  const known = await Bracket.within(commission, db).where({ commissionId, byHand: false }).orderBy(['createdAt', 'id']);
  const open = new Set(known.map(({ id }) => id));
  // A bracket with a frame that is left alone is left alone as a whole.
  const frames = measured.filter(({ id, bracketId }) => !shown.has(id) && (bracketId === null || open.has(bracketId)));
  const used = new Set(frames.map(({ bracketId }) => bracketId));
  return { frames, brackets: known.filter(({ id }) => used.has(id)) };
}
