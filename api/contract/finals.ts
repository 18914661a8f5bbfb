import { z } from 'zod';
import type { Operation } from './operation.ts';

/** Signed addresses of a final's pictures without watermark, by their longest side in pixels. */
const Pictures = z.object({ '480': z.string(), '960': z.string(), '2560': z.string() });

/** A file of a final. The newest is the one that counts. */
export const FinalVersionItem = z.object({
  id: z.uuid(),
  number: z.number().int(),
  name: z.string(),
  /** As the file was called where it came from. */
  originalName: z.string(),
  mediaType: z.string(),
  /** Bytes. */
  size: z.number().int(),
  sha256: z.string(),
  /** Pixels, upright. */
  width: z.number().int(),
  height: z.number().int(),
  /** ThumbHash in base64. */
  placeholder: z.string().nullable(),
  /** Null until they are made. */
  pictures: Pictures.nullable(),
  createdAt: z.iso.datetime(),
  /** Numbers of the deliveries it is part of; such a version stays. */
  deliveries: z.array(z.number().int()),
  can: z.object({ remove: z.boolean() }),
});
export type FinalVersionItem = z.infer<typeof FinalVersionItem>;

/** Why a final's pick has to be asked. */
export const Doubt = z.enum(['several', 'weak-name', 'time-contradicts', 'time-only', 'nothing-alike']);
export type Doubt = z.infer<typeof Doubt>;

export const FinalItem = z.object({
  id: z.uuid(),
  /** What it is called in a delivery: its own title, else the view's, else the file's name. */
  title: z.string(),
  /** Whether somebody wrote the title. */
  ownTitle: z.boolean(),
  match: z.enum(['by-name', 'by-hand', 'ask', 'none']),
  frameId: z.uuid().nullable(),
  /** Set while it has to be asked. */
  doubt: Doubt.nullable(),
  /** Frames that may be meant, likeliest first. */
  candidates: z.array(z.uuid()),
  /** Newest first. */
  versions: z.array(FinalVersionItem),
  version: z.number().int(),
});
export type FinalItem = z.infer<typeof FinalItem>;

/** A pick of the newest pick lists that waits for its final, or has it. */
export const PickForFinal = z.object({
  frameId: z.uuid(),
  frameName: z.string(),
  /** Frames of the bracket; 1 for a single frame. */
  exposures: z.number().int(),
  number: z.number().int(),
  sheetNumber: z.number().int(),
  viewTitle: z.string().nullable(),
  extra: z.boolean(),
  width: z.number().int(),
  height: z.number().int(),
  placeholder: z.string().nullable(),
  picture: z.string().nullable(),
  finalId: z.uuid().nullable(),
});
export type PickForFinal = z.infer<typeof PickForFinal>;

export const FinalList = z.object({
  /** In the order of the pick lists. */
  picks: z.array(PickForFinal),
  /** To be asked first, then in the order of their picks, further finals last. */
  finals: z.array(FinalItem),
  figures: z.object({
    picks: z.number().int(),
    picksWithFinal: z.number().int(),
    toAsk: z.number().int(),
    further: z.number().int(),
    /** Bytes of the newest versions. */
    bytes: z.number().int(),
  }),
  can: z.object({ change: z.boolean() }),
});
export type FinalList = z.infer<typeof FinalList>;

/** A missing field means "leave". `frameId: null` says: not one of the picks. `title: ''` takes the usual one again. */
export const ChangeFinal = z
  .object({ frameId: z.uuid().nullable().optional(), title: z.string().trim().max(200, 'At most 200 characters.').optional() })
  .refine((change) => change.frameId !== undefined || change.title !== undefined, 'Nothing to change.');
export type ChangeFinal = z.infer<typeof ChangeFinal>;

const many = '/api/commissions/{commissionId}/finals';
const version = '/api/final-versions/{versionId}';

export const finalOperations: Operation[] = [
  { method: 'get', path: many, summary: 'The finals of a commission and the picks they belong to', who: 'staff', answer: FinalList },
  {
    method: 'patch',
    path: '/api/finals/{finalId}',
    summary: 'Say which pick a final belongs to, or that it belongs to none; change its title',
    who: 'staff',
    body: ChangeFinal,
    answer: FinalList,
    ifMatch: true,
  },
  {
    method: 'post',
    path: `${version}/detach`,
    summary: 'Make a version a final of its own, to be asked anew',
    who: 'staff',
    answer: FinalList,
  },
  {
    method: 'post',
    path: `${version}/remove`,
    summary: 'Remove a version; it can be restored for 30 days',
    who: 'staff',
    answer: FinalList,
  },
  { method: 'post', path: `${version}/restore`, summary: 'Restore a removed version', who: 'staff', answer: FinalList },
];
