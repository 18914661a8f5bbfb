import type { Context } from '../../context.ts';
import type { ChangeStudio, StudioSettings } from '../../contract/studios.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { Studio } from '../../models/Studio.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { chargeable } from './currencies.ts';
import { presentStudio } from './presenter.ts';

/** The settings of the actor's studio. */
export async function readStudio(ctx: Context, actor: StaffActor): Promise<StudioSettings> {
  return presentStudio(await Studio.query(ctx.knex).findById(actor.studioId).throwIfNotFound(), actor);
}

/** Changes the settings that are named. @throws Problem 412 where `version` is not the present one, 422 for an unknown currency */
export async function changeStudio(ctx: Context, actor: StaffActor, version: number, change: ChangeStudio): Promise<StudioSettings> {
  if (change.currency && !chargeable().some(({ code }) => code === change.currency)) {
    throw invalid([{ path: 'currency', message: `${change.currency} is no currency that can be charged in.` }]);
  }
  await ctx.knex.transaction(async (trx) => {
    const changed = await Studio.query(trx)
      .where({ id: actor.studioId, version })
      .patch({ ...change, version: version + 1 });
    if (changed === 0) throw problem(412);
    await addToRecord(trx, {
      studioId: actor.studioId,
      actor,
      did: 'studio.changed',
      says: `Changed the studio's ${wordsOf(change)}`,
      about: { ...change },
    });
  });
  return readStudio(ctx, actor);
}

const WORDS = { name: 'name', replyTo: 'reply address', timeZone: 'time zone', currency: 'currency' } satisfies Record<
  keyof ChangeStudio,
  string
>;

function wordsOf(change: ChangeStudio): string {
  const names = (Object.keys(WORDS) as (keyof ChangeStudio)[]).filter((key) => change[key] !== undefined).map((key) => WORDS[key]);
  return new Intl.ListFormat('en-GB').format(names) || 'settings';
}
