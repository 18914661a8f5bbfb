import type { QueryBuilder } from 'objection';
import type { TakenOut } from '../../contract/brackets.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { problem } from '../../middleware/problem.ts';
import { Bracket } from '../../models/Bracket.ts';
import { Frame } from '../../models/Frame.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { announceBrackets } from './announce-brackets.ts';
import { type HeldBracket, holdBracket } from './find-bracket.ts';
import { leaveByHand } from './join-frames.ts';
import { readBracket } from './list-brackets.ts';
import { whyNotRegrouped } from './policy.ts';
import { dissolveBracket } from './settle-bracket.ts';

function refuseShown({ shown }: HeldBracket): void {
  const why = whyNotRegrouped(shown);
  if (why) throw problem(409, `This bracket stays as it is. ${why}`, { code: 'shown' });
}

/** Makes frames single frames that the machine leaves alone. Returns their ids. */
async function letGo(frames: QueryBuilder<Frame>): Promise<string[]> {
  const rows = await frames.patch({ bracketId: null, groupedByHand: true }).returning('id');
  return (rows as unknown as Pick<Frame, 'id'>[]).map(({ id }) => id);
}

/**
 * Makes the frames of a bracket single frames, for good: the machine leaves them alone. Joining them again undoes it.
 * @returns ids of the frames @throws Problem 404, 409 for what a client has been shown or picked
 */
export async function splitBracket(actor: StaffActor, bracketId: string): Promise<string[]> {
  return Bracket.transaction(async (trx) => {
    const held = await holdBracket(actor, bracketId, trx);
    refuseShown(held);
    const { bracket } = held;
    const frameIds = await letGo(Frame.within(actor, trx).where({ bracketId }));
    await dissolveBracket(trx, bracket);
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: bracket.commissionId,
      actor,
      did: 'frame.split',
      says: `Split a bracket of ${frameIds.length} frames`,
      about: { bracketId, frameIds },
    });
    await announceBrackets(trx, bracket.commissionId);
    return frameIds;
  });
}

/**
 * Takes frames out of a bracket, for good. Ids of frames that are not in it are passed over; where one frame is left the bracket goes.
 * @throws Problem 404, 409 for what a client has been shown or picked
 */
export async function takeOutFrames(ctx: Context, actor: StaffActor, bracketId: string, frameIds: string[]): Promise<TakenOut> {
  const { taken, left } = await Bracket.transaction(async (trx) => {
    const held = await holdBracket(actor, bracketId, trx);
    refuseShown(held);
    const { bracket } = held;
    const taken = await letGo(Frame.within(actor, trx).where({ bracketId }).whereIn('id', frameIds));
    if (taken.length === 0) return { taken, left: bracket };
    const left = await leaveByHand(trx, bracket);
    await addToRecord(trx, {
      studioId: actor.studioId,
      commissionId: bracket.commissionId,
      actor,
      did: 'frame.taken-out',
      says: `Took ${taken.length === 1 ? 'a frame' : `${taken.length} frames`} out of a bracket`,
      about: { bracketId, frameIds: taken },
    });
    await announceBrackets(trx, bracket.commissionId);
    return { taken, left };
  });
  return { frameIds: taken, bracket: left && (await readBracket(ctx, actor, bracketId)) };
}
