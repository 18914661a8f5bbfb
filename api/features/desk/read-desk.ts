import type { Desk, DeskGroup, DeskRow, Whose } from '../../contract/desk.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { Studio } from '../../models/Studio.ts';
import { pictureAddress } from '../../services/picture-address.ts';
import { frameKey } from '../../services/storage-keys.ts';
import { storedBytes } from '../uploads/storage-room.ts';
import { countLinksEnding, type DeskFacts, readDeskFacts } from './desk-facts.ts';
import { nextStep, type NextStep } from './next-step.ts';

const MOST_ROWS = 100;
const GROUPS: readonly Whose[] = ['yours', 'theirs', 'settled'];

/** The desk: every commission that is not closed, by whose move it is. Four questions to the database, however many commissions. */
export async function readDesk(ctx: Context, actor: StaffActor, now = new Date()): Promise<Desk> {
  const [studio, facts, stored, linksEnding] = await Promise.all([
    Studio.query().findById(actor.studioId).select('timeZone').throwIfNotFound(),
    readDeskFacts(ctx.knex, actor),
    storedBytes(ctx, actor),
    countLinksEnding(ctx.knex, actor),
  ]);
  const moment = { now, today: dayIn(studio.timeZone, now) };
  const steps = facts.map((each) => ({ facts: each, step: nextStep(each, moment) }));
  const groups = await Promise.all(GROUPS.map((whose) => groupOf(ctx, actor, whose, steps)));
  return {
    figures: {
      yours: groups[0]?.count ?? 0,
      theirs: groups[1]?.count ?? 0,
      linksEnding,
      storedBytes: stored,
      storageBytes: ctx.config.limits.storageBytes,
    },
    groups,
  };
}

interface Placed {
  facts: DeskFacts;
  step: NextStep;
}

async function groupOf(ctx: Context, actor: StaffActor, whose: Whose, all: Placed[]): Promise<DeskGroup> {
  const mine = all.filter(({ step }) => step.whose === whose).sort(whose === 'settled' ? newestFirst : mostPressingFirst);
  const rows = await Promise.all(mine.slice(0, MOST_ROWS).map(({ facts, step }) => presentRow(ctx, actor, facts, step)));
  return { whose, count: mine.length, rows };
}

/** Urgent before not; then what has a date by that date; then what waits longest. */
function mostPressingFirst(one: Placed, other: Placed): number {
  const [a, b] = [one.step.when, other.step.when];
  const rank = (when: NextStep['when']) => (when?.urgent ? 0 : when && when.kind !== 'since' ? 1 : 2);
  return rank(a) - rank(b) || Date.parse(a?.at ?? '') - Date.parse(b?.at ?? '') || one.facts.title.localeCompare(other.facts.title);
}

function newestFirst(one: Placed, other: Placed): number {
  return (other.facts.deliverySentAt?.getTime() ?? 0) - (one.facts.deliverySentAt?.getTime() ?? 0);
}

/** The day it is somewhere: "2026-12-01". */
function dayIn(timeZone: string, now: Date): string {
  return new Intl.DateTimeFormat('sv-SE', { timeZone, dateStyle: 'short' }).format(now);
}

async function presentRow(ctx: Context, actor: StaffActor, facts: DeskFacts, { says, when, action }: NextStep): Promise<DeskRow> {
  return {
    commission: { id: facts.id, title: facts.title, client: facts.clientName },
    picture: await presentPicture(ctx, actor, facts),
    says,
    when,
    action,
  };
}

async function presentPicture(ctx: Context, { studioId }: StaffActor, facts: DeskFacts): Promise<DeskRow['picture']> {
  const { pictureId, pictureRecipe, pictureWidth, pictureHeight, picturePlaceholder } = facts;
  if (pictureId === null || pictureWidth === null || pictureHeight === null) return null;
  const key = frameKey({ studioId, commissionId: facts.id, id: pictureId, recipe: pictureRecipe }, 480);
  return { small: await pictureAddress(ctx, key), width: pictureWidth, height: pictureHeight, placeholder: picturePlaceholder };
}
