import { z } from 'zod';
import type { Operation } from './operation.ts';

export const FrameState = z.enum(['reading', 'ready', 'failed']);
export type FrameState = z.infer<typeof FrameState>;

/** Where a frame's pictures are, longest sides in pixels. Signed addresses: they stay the same for hours and then end. */
export const FramePictures = z.object({ '480': z.string(), '960': z.string() });
export type FramePictures = z.infer<typeof FramePictures>;

/** Something to know about a frame, in plain words; for the photographer alone. */
export const FrameCheck = z.object({
  /** Which check it is, for filters: "highlights". */
  check: z.string(),
  /** One sentence. */
  says: z.string(),
  /** A word or two for a label. */
  short: z.string(),
  /** Whether somebody should look; the rest is information. */
  toCheck: z.boolean(),
});
export type FrameCheck = z.infer<typeof FrameCheck>;

/** Near-doubles stand together, so that one is kept. */
export const Alike = z.object({
  /** The same for all frames of the group. */
  group: z.uuid(),
  /** Frames of the group. */
  count: z.number().int(),
  /** Where it is the sharpest or the softest of them. */
  is: z.enum(['sharpest', 'softest']).nullable(),
});
export type Alike = z.infer<typeof Alike>;

/** A frame in a list: what a row of pictures needs and no more, as there may be ten thousand. */
export const FrameItem = z.object({
  id: z.uuid(),
  /** Cleaned file name. */
  name: z.string(),
  /** `reading` while its pictures are being made. */
  state: FrameState,
  problem: z.string().nullable(),
  /** Pixels, upright. */
  width: z.number().int(),
  height: z.number().int(),
  /** ThumbHash in base64. */
  placeholder: z.string().nullable(),
  /** Null until they are made. */
  pictures: FramePictures.nullable(),
  viewId: z.uuid().nullable(),
  hidden: z.boolean(),
  /** The camera's wall clock without a zone, "2026-10-28T17:06:12.34". */
  takenLocal: z.string().nullable(),
  fNumber: z.number().nullable(),
  /** Seconds. */
  exposureTime: z.number().nullable(),
  iso: z.number().int().nullable(),
  /** Millimetres. */
  focalLength: z.number().nullable(),
  /** The bracket it belongs to. */
  bracketId: z.uuid().nullable(),
  /** Empty as well while it has not been measured yet. */
  checks: z.array(FrameCheck),
  /** Null where no other frame looks nearly alike. */
  alike: Alike.nullable(),
});
export type FrameItem = z.infer<typeof FrameItem>;

/** Parts of 100,000 of the picture in each of 64 steps from black to white. */
const Tones = z.array(z.number().int());
/** Shares of the picture at one end of the scale, 0 to 1. */
const AtLimit = z.object({
  /** In at least one channel. */
  any: z.number(),
  /** In all three. */
  all: z.number(),
  /** In large areas, where it is no lamp. */
  areas: z.number(),
});

/** What the viewer shows of a frame's measures. */
export const ShownMeasures = z.object({
  histogram: z.object({ red: Tones, green: Tones, blue: Tones, luma: Tones }),
  highlights: AtLimit,
  shadows: AtLimit,
  /** Stops between the brightest parts and the limit. */
  headroom: z.number(),
});
export type ShownMeasures = z.infer<typeof ShownMeasures>;

/** A frame with everything that is known of it. */
export const Frame = FrameItem.extend({
  commissionId: z.uuid(),
  pictures: FramePictures.extend({ '2560': z.string() }).nullable(),
  originalName: z.string(),
  mediaType: z.string(),
  /** Bytes. */
  size: z.number().int(),
  sha256: z.string(),
  /** The instant, where the camera wrote its offset. */
  takenAt: z.iso.datetime().nullable(),
  takenOffsetMinutes: z.number().int().nullable(),
  make: z.string().nullable(),
  model: z.string().nullable(),
  lens: z.string().nullable(),
  serial: z.string().nullable(),
  focalLength35: z.number().nullable(),
  /** EV. */
  exposureBias: z.number().nullable(),
  /** 0 automatic, 1 by hand, 2 automatic bracket. */
  exposureMode: z.number().int().nullable(),
  orientation: z.number().int(),
  /** Degrees, north and east positive. */
  latitude: z.number().nullable(),
  longitude: z.number().nullable(),
  hiddenAt: z.iso.datetime().nullable(),
  deletedAt: z.iso.datetime().nullable(),
  createdAt: z.iso.datetime(),
  /** Stops brighter than the lead of its bracket. */
  step: z.number().nullable(),
  /** Null until it is measured. */
  measures: ShownMeasures.nullable(),
});
export type Frame = z.infer<typeof Frame>;

export const FrameSort = z.enum(['taken', 'name', 'added', 'f-number', 'exposure-time', 'iso', 'focal-length']);
export type FrameSort = z.infer<typeof FrameSort>;

export const FrameQuery = z.object({
  after: z.string().optional(),
  limit: z.coerce.number().int().min(1).max(1000).default(200),
  /** What is unknown stands last, whatever the order. */
  sort: FrameSort.default('taken'),
  order: z.enum(['asc', 'desc']).default('asc'),
  /** A view's id, or `none` for frames under no view. */
  view: z.union([z.uuid(), z.literal('none')]).optional(),
  /** `without` leaves hidden frames out, `only` shows nothing else; both where nothing is said. */
  hidden: z.enum(['without', 'only']).optional(),
  state: FrameState.optional(),
  /** Part of the name, any case. */
  text: z.string().trim().max(200).optional(),
  /** Deleted frames that can still be restored, instead of those that are there. */
  deleted: z.literal('only').optional(),
});
export type FrameQuery = z.infer<typeof FrameQuery>;

export const FrameList = z.object({ items: z.array(FrameItem), next: z.string().nullable() });
export type FrameList = z.infer<typeof FrameList>;

/** The figures of a commission's frames. Deleted ones count in `deleted` alone. */
export const FrameSummary = z.object({
  total: z.number().int(),
  ready: z.number().int(),
  reading: z.number().int(),
  failed: z.number().int(),
  hidden: z.number().int(),
  deleted: z.number().int(),
  /** Bytes of the originals. */
  bytes: z.number().int(),
  underNoView: z.number().int(),
  brackets: z.number().int(),
  /** Frames in no bracket. */
  single: z.number().int(),
  /** Frames with something that somebody should look at. */
  toCheck: z.number().int(),
  /** Frames that look nearly like another. */
  alike: z.number().int(),
  views: z.array(z.object({ viewId: z.uuid(), count: z.number().int() })),
  can: z.object({ upload: z.boolean(), change: z.boolean() }),
});
export type FrameSummary = z.infer<typeof FrameSummary>;

/** At most a thousand at once. */
export const FrameIds = z.object({ frameIds: z.array(z.uuid()).min(1, 'Choose a frame first.').max(1000, 'At most 1000 frames at once.') });
export type FrameIds = z.infer<typeof FrameIds>;

/** `viewId: null` takes them down from their views. */
export const HangFrames = FrameIds.extend({ viewId: z.uuid().nullable() });
export type HangFrames = z.infer<typeof HangFrames>;

/** Ids of the frames that were changed; those that were so already, or are not there, are not among them. */
export const FramesChanged = z.object({ frameIds: z.array(z.uuid()) });
export type FramesChanged = z.infer<typeof FramesChanged>;

/** What stayed, and why, in one sentence each. */
export const FramesChangedExcept = FramesChanged.extend({
  refused: z.array(z.object({ frameId: z.uuid(), name: z.string(), why: z.string() })),
});
export type FramesChangedExcept = z.infer<typeof FramesChangedExcept>;

/**
 * What GET /api/commissions/{commissionId}/events tells, as server-sent events whose data is one of these. `missed`: the line
 * was down, read everything anew.
 */
export const CommissionEvent = z.union([
  z.object({ what: z.enum(['upload-checking', 'upload-cancelled']), uploadId: z.uuid() }),
  z.object({ what: z.literal('upload-done'), uploadId: z.uuid(), frameId: z.uuid().nullable() }),
  z.object({ what: z.literal('upload-failed'), uploadId: z.uuid(), problem: z.string() }),
  z.object({ what: z.enum(['frame-added', 'frame-ready', 'frame-failed']), frameId: z.uuid(), uploadId: z.uuid().nullable() }),
  z.object({ what: z.literal('frames-changed') }),
  /** Frames were measured, grouped or merged: read brackets and frames anew. */
  z.object({ what: z.literal('brackets-changed') }),
  z.object({ what: z.literal('missed') }),
  z.object({ what: z.string() }).loose(),
]);
export type CommissionEvent = z.infer<typeof CommissionEvent>;

const many = '/api/commissions/{commissionId}/frames';

export const frameOperations: Operation[] = [
  { method: 'get', path: many, summary: 'Frames of a commission', who: 'staff', query: FrameQuery, answer: FrameList },
  { method: 'get', path: `${many}/summary`, summary: 'How many frames there are, by state and view', who: 'staff', answer: FrameSummary },
  { method: 'post', path: `${many}/hide`, summary: 'Hide frames', who: 'staff', body: FrameIds, answer: FramesChanged },
  { method: 'post', path: `${many}/show`, summary: 'Show hidden frames again', who: 'staff', body: FrameIds, answer: FramesChanged },
  { method: 'post', path: `${many}/hang`, summary: 'Hang frames under a view', who: 'staff', body: HangFrames, answer: FramesChanged },
  {
    method: 'post',
    path: `${many}/delete`,
    summary: 'Delete frames; they can be restored for 30 days',
    who: 'staff',
    body: FrameIds,
    answer: FramesChangedExcept,
  },
  {
    method: 'post',
    path: `${many}/restore`,
    summary: 'Restore deleted frames',
    who: 'staff',
    body: FrameIds,
    answer: FramesChangedExcept,
  },
  { method: 'get', path: '/api/frames/{frameId}', summary: 'A frame with everything known of it', who: 'staff', answer: Frame },
  {
    method: 'get',
    path: '/api/commissions/{commissionId}/events',
    summary: 'What happens in a commission, as it happens',
    who: 'staff',
    answer: 'text/event-stream',
  },
  {
    method: 'get',
    path: '/pictures/{key}',
    summary: 'A picture by its signed address',
    who: 'anyone',
    answer: 'image/jpeg',
  },
];
