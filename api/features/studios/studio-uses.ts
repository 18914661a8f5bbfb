import type { Context } from '../../context.ts';
import type { StudioUses } from '../../contract/studios.ts';
import { DEFAULT_USES } from '../../domain/default-uses.ts';
import type { Use } from '../../domain/fit-for-use.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Studio } from '../../models/Studio.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { mayChangeStudio } from './policy.ts';

/** What a studio's pictures are wanted for. */
export function usesOf({ uses }: Pick<Studio, 'uses'>): Use[] {
  return uses ?? [...DEFAULT_USES];
}

/** The studio's table of uses. */
export async function readUses(actor: StaffActor): Promise<StudioUses> {
  const studio = await Studio.query().findById(actor.studioId).throwIfNotFound();
  return { uses: usesOf(studio), defaults: [...DEFAULT_USES], can: { change: mayChangeStudio(actor) } };
}

/** Puts another table in its place. */
export async function changeUses(ctx: Context, actor: StaffActor, uses: Use[]): Promise<StudioUses> {
  await ctx.knex.transaction(async (trx) => {
    await Studio.query(trx).findById(actor.studioId).patch({ uses });
    await addToRecord(trx, {
      studioId: actor.studioId,
      actor,
      did: 'studio.uses-changed',
      says: `Changed the table of uses: ${uses.length} ${uses.length === 1 ? 'use' : 'uses'}`,
      about: { uses: uses.map(({ title }) => title) },
    });
  });
  return readUses(actor);
}
