import type { PickListDetail, PickListLine, PickRow } from '../../contract/pick-lists.ts';
import type { Context } from '../../context.ts';
import type { StudioScope } from '../../db/scope.ts';
import { problem } from '../../middleware/problem.ts';
import { Commission } from '../../models/Commission.ts';
import type { Frame } from '../../models/Frame.ts';
import { PickList } from '../../models/PickList.ts';
import { Proof } from '../../models/Proof.ts';
import { pictureAddress } from '../../services/picture-address.ts';
import { type ShownPicture, shownPicture } from '../brackets/shown-picture.ts';
import type { ProofWithPicture } from '../sheets/presenter.ts';
import { framesOfPick, framesOfPicks } from './picked-frames.ts';

type ListRow = PickList & { sheetNumber: number; latest: boolean; originalsBytes: number; originals: number };

/** Lists go with their commission: while that is deleted, there are none. */
function listsOf(ctx: Context, scope: StudioScope) {
  return PickList.within(scope)
    .join('sheets', 'sheets.id', 'pickLists.sheetId')
    .joinRaw('join commissions on commissions.id = pick_lists.commission_id and commissions.deleted_at is null')
    .select(
      'pickLists.*',
      'sheets.number as sheetNumber',
      ctx.knex.raw(
        'not exists (select from pick_lists newer where newer.sheet_id = pick_lists.sheet_id and newer.number > pick_lists.number) as latest',
      ),
      ctx.knex.raw(`(select coalesce(sum(f.size_bytes), 0)::bigint from picks p join frames f on f.id = any(p.frame_ids || p.frame_id)
        where p.pick_list_id = pick_lists.id) as originals_bytes`),
      ctx.knex.raw(`(select coalesce(sum(greatest(cardinality(p.frame_ids), 1)), 0)::int from picks p
        where p.pick_list_id = pick_lists.id) as originals`),
    );
}

function presentLine(list: ListRow): PickListLine {
  return {
    id: list.id,
    sheetId: list.sheetId,
    sheetNumber: list.sheetNumber,
    number: list.number,
    latest: list.latest,
    sentAt: list.sentAt.toISOString(),
    sentBy: list.sentByName,
    words: list.words,
    pickCount: list.pickCount,
    allowance: list.allowance,
    extraCount: list.extraCount,
    extraPrice: list.extraPrice,
    currency: list.currency,
    originalsBytes: list.originalsBytes,
    originals: list.originals,
  };
}

/** The pick lists of a commission, newest first. */
export async function listPickLists(ctx: Context, scope: StudioScope, commissionId: string): Promise<PickListLine[]> {
  const commission = await Commission.within(scope).findById(commissionId).whereNull('deletedAt').select('id');
  if (!commission) throw problem(404);
  const lists = await listsOf(ctx, scope).where({ 'pickLists.commissionId': commissionId }).orderBy('sentAt', 'desc').castTo<ListRow[]>();
  return lists.map(presentLine);
}

/** One list with its picks, and what changed against the list before. */
export async function loadPickList(ctx: Context, scope: StudioScope, pickListId: string): Promise<PickListDetail> {
  const list = await listsOf(ctx, scope).where({ 'pickLists.id': pickListId }).first().castTo<ListRow | undefined>();
  if (!list) throw problem(404);
  const before = list.number > 1 ? await picksOf(ctx, scope, { sheetId: list.sheetId, number: list.number - 1 }) : null;
  const picks = await picksOf(ctx, scope, { sheetId: list.sheetId, number: list.number });
  const frames = await framesOfPicks(scope, picks);
  const pictures = await picturesOf(scope, picks);
  const had = before && new Set(before.map((pick) => pick.proofId));
  const has = new Set(picks.map((pick) => pick.proofId));
  return {
    ...presentLine(list),
    picks: await Promise.all(
      picks.map(async (pick) => ({
        ...(await presentPick(ctx, pick, frames, pictures)),
        change: had && (had.has(pick.proofId) ? 'kept' : 'added'),
      })),
    ),
    dropped: (before ?? [])
      .filter((pick) => !has.has(pick.proofId))
      .map(({ proofNumber, frameName, viewTitle }) => ({ proofNumber, frameName, viewTitle })),
  };
}

interface FullPick {
  id: string;
  studioId: string;
  number: number;
  proofId: string;
  proofNumber: number;
  frameId: string;
  frameName: string;
  frameIds: string[];
  viewTitle: string | null;
  extra: boolean;
  markedBy: PickRow['markedBy'];
  finalId: string | null;
  versions: number;
}

async function picksOf(ctx: Context, scope: StudioScope, list: { sheetId: string; number: number }): Promise<FullPick[]> {
  return ctx
    .knex('picks')
    .join('pickLists', 'pickLists.id', 'picks.pickListId')
    .joinRaw('left join finals on finals.frame_id = picks.frame_id and finals.deleted_at is null')
    .where({ 'pickLists.sheetId': list.sheetId, 'pickLists.number': list.number, 'picks.studioId': scope.studioId })
    .orderBy('picks.number')
    .select(
      'picks.*',
      'finals.id as finalId',
      ctx.knex.raw('(select count(*)::int from final_versions v where v.final_id = finals.id and v.deleted_at is null) as versions'),
    );
}

/** What the client saw of each pick, by its proof. */
async function picturesOf(scope: StudioScope, picks: readonly FullPick[]): Promise<Map<string, ShownPicture>> {
  const proofs = (await Proof.within(scope)
    .findByIds(picks.map(({ proofId }) => proofId))
    .withGraphFetched('[frame, bracket]')) as ProofWithPicture[];
  return new Map(proofs.map(({ id, frame, bracket }) => [id, shownPicture(frame, bracket)]));
}

async function presentPick(
  ctx: Context,
  pick: FullPick,
  frames: Map<string, Frame>,
  pictures: Map<string, ShownPicture>,
): Promise<Omit<PickRow, 'change'>> {
  const picked = framesOfPick(pick, frames);
  // The pick's row holds on to its proof, so that is there.
  const shown = pictures.get(pick.proofId) as ShownPicture;
  return {
    id: pick.id,
    number: pick.number,
    proofNumber: pick.proofNumber,
    frameId: pick.frameId,
    frameName: pick.frameName,
    frames: picked.map(({ id, name }) => ({ id, name })),
    viewTitle: pick.viewTitle,
    extra: pick.extra,
    markedBy: pick.markedBy,
    width: shown.width,
    height: shown.height,
    placeholder: shown.placeholder,
    picture: await pictureAddress(ctx, shown.key(480)),
    sizeBytes: picked.reduce((sum, { sizeBytes }) => sum + sizeBytes, 0),
    final: pick.finalId ? { finalId: pick.finalId, versions: pick.versions } : null,
  };
}
