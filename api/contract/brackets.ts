import { z } from 'zod';
import { FEWEST_EXPOSURES, MOST_EXPOSURES } from '../domain/brackets/candidate.ts';
import { FramePictures, FramesChanged } from './frames.ts';
import type { Operation } from './operation.ts';

export { FEWEST_EXPOSURES, MOST_EXPOSURES };

/** The fused picture of a bracket. `waiting` while it is being made; where it `failed` the lead frame is shown in its place. */
export const MergedPicture = z.object({
  state: z.enum(['waiting', 'ready', 'failed']),
  /** Pixels of the largest picture; null until it is made. */
  width: z.number().int().nullable(),
  height: z.number().int().nullable(),
  /** ThumbHash in base64. */
  placeholder: z.string().nullable(),
  /** Signed addresses without watermark; null until they are made. */
  pictures: FramePictures.extend({ '2560': z.string() }).nullable(),
  /** Frames that could not be laid over the lead, with the reason in one sentence. */
  leftOut: z.array(z.object({ frameId: z.uuid(), says: z.string() })),
  /** Why there is no merged picture, in one sentence. */
  problem: z.string().nullable(),
});
export type MergedPicture = z.infer<typeof MergedPicture>;

/** Frames of one composition at different exposures. */
export const Bracket = z.object({
  id: z.uuid(),
  leadFrameId: z.uuid(),
  /** Darkest first. */
  frameIds: z.array(z.uuid()),
  /** Stops brighter than the lead, in the order of the frames; null where the camera did not say how it exposed. */
  steps: z.array(z.number().nullable()),
  /** What it is, in words: "5 frames, 2 stops apart, f/11, ISO 100". */
  says: z.string(),
  /** Somebody decided which frames belong to it: it is not regrouped any more. */
  byHand: z.boolean(),
  /** What its proof is: the merged picture, or the lead frame. */
  shows: z.enum(['merged', 'lead']),
  merged: MergedPicture,
  /** When its first frame was taken, by the camera's wall clock. */
  takenLocal: z.string().nullable(),
  /** View of the lead frame. */
  viewId: z.uuid().nullable(),
  can: z.object({
    /** Split it, take a frame out. */
    regroup: z.boolean(),
    /** Name another lead frame, show merged or lead. */
    change: z.boolean(),
    /** Why not, in one sentence. */
    why: z.string().nullable(),
  }),
});
export type Bracket = z.infer<typeof Bracket>;

export const BracketList = z.object({ items: z.array(Bracket) });
export type BracketList = z.infer<typeof BracketList>;

/** Exactly these frames: a bracket that one of them belonged to goes on without it. */
export const JoinFrames = z.object({
  frameIds: z
    .array(z.uuid())
    .min(FEWEST_EXPOSURES, 'Choose at least two frames.')
    .max(MOST_EXPOSURES, 'A bracket has at most nine frames.'),
  /** The one in the middle of the exposures where nothing is said. */
  leadFrameId: z.uuid().optional(),
});
export type JoinFrames = z.infer<typeof JoinFrames>;

export const TakeOutFrames = z.object({ frameIds: z.array(z.uuid()).min(1, 'Choose a frame first.').max(MOST_EXPOSURES) });
export type TakeOutFrames = z.infer<typeof TakeOutFrames>;

/** A missing field means "leave". */
export const ChangeBracket = z
  .object({ leadFrameId: z.uuid().optional(), shows: z.enum(['merged', 'lead']).optional() })
  .refine((change) => change.leadFrameId !== undefined || change.shows !== undefined, 'Nothing to change.');
export type ChangeBracket = z.infer<typeof ChangeBracket>;

/** Frames that are single frames now, and what is left of their bracket: null where that was one frame or none. */
export const TakenOut = z.object({ frameIds: z.array(z.uuid()), bracket: Bracket.nullable() });
export type TakenOut = z.infer<typeof TakenOut>;

const many = '/api/commissions/{commissionId}/brackets';
const bracket = '/api/brackets/{bracketId}';

export const bracketOperations: Operation[] = [
  { method: 'get', path: many, summary: 'The brackets of a commission, in the order they were taken', who: 'staff', answer: BracketList },
  { method: 'post', path: many, summary: 'Join frames to a bracket', who: 'staff', body: JoinFrames, answer: Bracket, status: 201 },
  {
    method: 'patch',
    path: bracket,
    summary: 'Name another lead frame, or say what its proof shows',
    who: 'staff',
    body: ChangeBracket,
    answer: Bracket,
  },
  { method: 'post', path: `${bracket}/split`, summary: 'Make its frames single frames', who: 'staff', answer: FramesChanged },
  {
    method: 'post',
    path: `${bracket}/take-out`,
    summary: 'Take frames out of it; where one is left the bracket goes',
    who: 'staff',
    body: TakeOutFrames,
    answer: TakenOut,
  },
];
