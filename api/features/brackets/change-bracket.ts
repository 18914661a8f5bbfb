import type { Transaction } from 'objection';
import type { ChangeBracket } from '../../contract/brackets.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Bracket } from '../../models/Bracket.ts';
import { Frame } from '../../models/Frame.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { announceBrackets } from './announce-brackets.ts';
import { holdBracket } from './find-bracket.ts';
import { whyNotChanged } from './policy.ts';
import { settleBracket } from './settle-bracket.ts';

/**
 * Names another lead frame, or says what the proof shows; open sheets follow, as with any other change to them.
 * @throws Problem 404, 409 where it was picked or its sheet is closed, 422 for a lead that is not in it
 */
export async function changeBracket(actor: StaffActor, bracketId: string, change: ChangeBracket): Promise<void> {
  await Bracket.transaction(async (trx) => {
    const { bracket, shown } = await holdBracket(actor, bracketId, trx);
    const { leadFrameId = bracket.leadFrameId, shows = bracket.shows } = change;
    const newLead = leadFrameId !== bracket.leadFrameId;
    if (!newLead && shows === bracket.shows) return;
    const why = whyNotChanged(shown);
    if (why) throw problem(409, `This bracket stays as it is. ${why}`, { code: 'shown' });
    const lead = await leadOf(trx, bracket, leadFrameId);
    if (newLead) await Bracket.within(actor, trx).findById(bracketId).patch({ leadByHand: true });
    await settleBracket(trx, bracket, { leadFrameId, shows });
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: bracket.commissionId,
      actor,
      did: 'frame.bracket-changed',
      says: newLead ? `Made “${lead.name}” the lead of its bracket` : `Shows ${sayShows(shows)} of the bracket of “${lead.name}”`,
      about: { bracketId, leadFrameId, shows },
    });
    await announceBrackets(trx, bracket.commissionId);
  });
}

const sayShows = (shows: Bracket['shows']) => (shows === 'merged' ? 'the merged picture' : 'the lead frame');

async function leadOf(trx: Transaction, bracket: Bracket, leadFrameId: string): Promise<Frame> {
  const lead = await Frame.within(bracket, trx).findOne({ id: leadFrameId, bracketId: bracket.id }).whereNull('deletedAt');
  if (!lead) throw invalid([{ path: 'leadFrameId', message: 'This frame is not in the bracket.' }]);
  return lead;
}
