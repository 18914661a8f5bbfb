import type { Context } from '../../context.ts';
import type { FinalItem, FinalList, FinalVersionItem, PickForFinal } from '../../contract/finals.ts';
import type { StudioScope } from '../../db/scope.ts';
import type { Commission } from '../../models/Commission.ts';
import type { FinalVersion } from '../../models/FinalVersion.ts';
import { pictureAddress } from '../../services/picture-address.ts';
import { finalKey, frameKey, type DerivativeSize } from '../../services/storage-keys.ts';
import { currentPicks, type CurrentPick } from './current-picks.ts';
import { findMatch } from './find-match.ts';
import { deliveriesOfVersions, loadFinals, titleOf, type LoadedFinal } from './load-finals.ts';

/** Everything the Finals page shows. */
export async function presentFinals(ctx: Context, scope: StudioScope, commission: Commission): Promise<FinalList> {
  const [picks, finals, delivered] = await Promise.all([
    currentPicks(scope, commission.id),
    loadFinals(scope, commission.id),
    deliveriesOfVersions(scope, commission.id),
  ]);
  const place = new Map(picks.map((pick, index) => [pick.frameId, index]));
  const asks = (final: LoadedFinal) => matchNow(final, picks) === 'ask';
  const order = (final: LoadedFinal) => (asks(final) ? -1 : final.frameId ? (place.get(final.frameId) ?? picks.length) : picks.length + 1);
  const ordered = [...finals].sort((a, b) => order(a) - order(b));
  const finalOfFrame = new Map(finals.map((final) => [final.frameId, final.id]));
  return {
    picks: await Promise.all(picks.map((pick) => presentPick(ctx, pick, finalOfFrame.get(pick.frameId) ?? null))),
    finals: await Promise.all(ordered.map((final) => presentFinal(ctx, commission, final, picks, delivered))),
    figures: {
      picks: picks.length,
      picksWithFinal: picks.filter((pick) => finalOfFrame.has(pick.frameId)).length,
      toAsk: finals.filter(asks).length,
      further: finals.filter((final) => matchNow(final, picks) === 'none').length,
      bytes: finals.reduce((sum, final) => sum + (final.versions[0]?.sizeBytes ?? 0), 0),
    },
    can: { change: commission.closedAt === null },
  };
}

/** While nothing is picked there is no question: such a final stands by itself until there is a pick it may belong to. */
function matchNow(final: LoadedFinal, picks: readonly CurrentPick[]): FinalItem['match'] {
  return final.match === 'ask' && picks.length === 0 ? 'none' : final.match;
}

async function presentPick(ctx: Context, pick: CurrentPick, finalId: string | null): Promise<PickForFinal> {
  const { frameId, frameName, number, sheetNumber, viewTitle, extra, frame, frames } = pick;
  const { width, height, placeholder } = frame;
  const picture = frame.state === 'ready' ? await pictureAddress(ctx, frameKey(frame, 480)) : null;
  const exposures = frames.length;
  return { frameId, frameName, exposures, number, sheetNumber, viewTitle, extra, width, height, placeholder, picture, finalId };
}

async function presentFinal(
  ctx: Context,
  commission: Commission,
  final: LoadedFinal,
  picks: readonly CurrentPick[],
  delivered: Map<string, number[]>,
): Promise<FinalItem> {
  // The question is put anew each time: a pick list may have come since the file was taken in.
  const [newest] = final.versions;
  const match = matchNow(final, picks);
  const question = match === 'ask' && newest ? findMatch(newest, picks) : null;
  const candidates = question?.frameId ? [question.frameId] : (question?.candidates ?? []);
  return {
    id: final.id,
    title: titleOf(
      final,
      picks.find((pick) => pick.frameId === final.frameId),
    ),
    ownTitle: final.title !== '',
    match,
    frameId: final.frameId,
    doubt: question ? (question.doubt ?? 'several') : null,
    candidates,
    versions: await Promise.all(final.versions.map((version) => presentVersion(ctx, commission, version, delivered.get(version.id) ?? []))),
    version: final.version,
  };
}

/** Signed addresses of a version's pictures; null until they are made. */
export async function versionPictures(ctx: Context, version: FinalVersion, commissionId: string) {
  if (version.recipe === null) return null;
  const address = (size: DerivativeSize) => pictureAddress(ctx, finalKey(version, commissionId, size));
  return { '480': await address(480), '960': await address(960), '2560': await address(2560) };
}

async function presentVersion(
  ctx: Context,
  commission: Commission,
  version: FinalVersion,
  deliveries: number[],
): Promise<FinalVersionItem> {
  return {
    id: version.id,
    number: version.number,
    name: version.name,
    originalName: version.originalName,
    mediaType: version.mediaType,
    size: version.sizeBytes,
    sha256: version.sha256,
    width: version.width,
    height: version.height,
    placeholder: version.placeholder,
    pictures: await versionPictures(ctx, version, commission.id),
    createdAt: version.createdAt.toISOString(),
    deliveries,
    can: { remove: commission.closedAt === null && deliveries.length === 0 },
  };
}
