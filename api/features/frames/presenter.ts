import type { Context } from '../../context.ts';
import type { Frame as FrameAnswer, FrameItem, ShownMeasures } from '../../contract/frames.ts';
import type { StudioScope } from '../../db/scope.ts';
import type { CheckThresholds } from '../../domain/check-thresholds.ts';
import type { AtLimit, FrameMeasures } from '../../domain/frame-measures.ts';
import type { DerivativeSize } from '../../imaging/derivative-sizes.ts';
import { Bracket } from '../../models/Bracket.ts';
import type { Frame } from '../../models/Frame.ts';
import { FrameMeasure } from '../../models/FrameMeasure.ts';
import { pictureAddress } from '../../services/picture-address.ts';
import { frameKey } from '../../services/storage-keys.ts';
import { framesOfBrackets } from '../brackets/bracket-frames.ts';
import { type CheckedFrame, checksOf, thresholdsOf } from './frame-checks.ts';

type Pictured = Pick<Frame, 'studioId' | 'commissionId' | 'id' | 'recipe'>;

/** The signed address of a frame's picture without watermark: for the studio's own pages only. */
export function framePicture(ctx: Context, frame: Pictured, size: DerivativeSize): Promise<string> {
  return pictureAddress(ctx, frameKey(frame, size));
}

async function smallPictures(ctx: Context, frame: Frame): Promise<FrameItem['pictures']> {
  if (frame.recipe === null) return null;
  const [small, medium] = await Promise.all([framePicture(ctx, frame, 480), framePicture(ctx, frame, 960)]);
  return { '480': small, '960': medium };
}

/** A frame as a row of pictures shows it. */
export async function presentFrameItem(ctx: Context, frame: CheckedFrame, thresholds: CheckThresholds): Promise<FrameItem> {
  return {
    id: frame.id,
    name: frame.name,
    state: frame.state,
    problem: frame.problem,
    width: frame.width,
    height: frame.height,
    placeholder: frame.placeholder,
    pictures: await smallPictures(ctx, frame),
    viewId: frame.viewId,
    hidden: frame.hiddenAt !== null,
    takenLocal: frame.takenLocal,
    fNumber: frame.fNumber,
    exposureTime: frame.exposureTime,
    iso: frame.iso,
    focalLength: frame.focalLength,
    bracketId: frame.bracketId,
    checks: checksOf(frame, thresholds),
    alike: frame.alike,
  };
}

const atLimit = ({ any, all, areas }: AtLimit) => ({ any, all, areas });

function presentMeasures({ histogram, highlights, shadows, headroom }: FrameMeasures): ShownMeasures {
  return { histogram, highlights: atLimit(highlights), shadows: atLimit(shadows), headroom };
}

/** Stops that a frame is brighter than the lead of its bracket. */
async function stepOf(scope: StudioScope, { id, bracketId }: Frame): Promise<number | null> {
  const bracket = bracketId === null ? undefined : await Bracket.within(scope).findById(bracketId);
  const arranged = bracket && (await framesOfBrackets(scope, [bracket])).get(bracket.id);
  return arranged?.steps[arranged.frames.findIndex((frame) => frame.id === id)] ?? null;
}

/** A frame with everything known of it. */
export async function presentFrame(ctx: Context, scope: StudioScope, frame: Frame): Promise<FrameAnswer> {
  const measures = (await FrameMeasure.within(scope).findById(frame.id))?.measures ?? null;
  const item = await presentFrameItem(ctx, Object.assign(frame, { measures }), await thresholdsOf(scope));
  return {
    ...item,
    commissionId: frame.commissionId,
    pictures: item.pictures && { ...item.pictures, '2560': await framePicture(ctx, frame, 2560) },
    originalName: frame.originalName,
    mediaType: frame.mediaType,
    size: frame.sizeBytes,
    sha256: frame.sha256,
    takenAt: frame.takenAt?.toISOString() ?? null,
    takenOffsetMinutes: frame.takenOffsetMinutes,
    make: frame.make,
    model: frame.model,
    lens: frame.lens,
    serial: frame.serial,
    focalLength35: frame.focalLength35,
    exposureBias: frame.exposureBias,
    exposureMode: frame.exposureMode,
    orientation: frame.orientation,
    latitude: frame.latitude,
    longitude: frame.longitude,
    hiddenAt: frame.hiddenAt?.toISOString() ?? null,
    deletedAt: frame.deletedAt?.toISOString() ?? null,
    createdAt: frame.createdAt.toISOString(),
    step: await stepOf(scope, frame),
    measures: measures && presentMeasures(measures),
  };
}
