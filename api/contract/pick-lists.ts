import { z } from 'zod';
import type { Operation } from './operation.ts';

export const PickRow = z.object({
  id: z.uuid(),
  number: z.number().int(),
  proofNumber: z.number().int(),
  frameId: z.uuid(),
  frameName: z.string(),
  /** Every frame that was picked with it: all of a bracket, darkest first; else the frame alone. */
  frames: z.array(z.object({ id: z.uuid(), name: z.string() })),
  viewTitle: z.string().nullable(),
  extra: z.boolean(),
  markedBy: z.array(z.object({ name: z.string(), initials: z.string(), role: z.enum(['lead', 'reviewer']) })),
  width: z.number().int(),
  height: z.number().int(),
  placeholder: z.string().nullable(),
  picture: z.string().nullable(),
  /** Bytes of its originals. */
  sizeBytes: z.number().int(),
  /** The finished file, where one was matched: its newest version's number. */
  final: z.object({ finalId: z.uuid(), versions: z.number().int() }).nullable(),
  /** What the list before had: nothing changed, newly picked. */
  change: z.enum(['kept', 'added']).nullable(),
});
export type PickRow = z.infer<typeof PickRow>;

/** One sent list. Money in minor units. */
export const PickListDetail = z.object({
  id: z.uuid(),
  sheetId: z.uuid(),
  sheetNumber: z.number().int(),
  number: z.number().int(),
  /** The newest list of its sheet. */
  latest: z.boolean(),
  sentAt: z.iso.datetime(),
  sentBy: z.string(),
  words: z.string(),
  pickCount: z.number().int(),
  allowance: z.number().int(),
  extraCount: z.number().int(),
  extraPrice: z.number().int(),
  currency: z.string(),
  originalsBytes: z.number().int(),
  /** Frames that were picked, those of brackets counted one by one. */
  originals: z.number().int(),
  picks: z.array(PickRow),
  /** Picks of the list before that are not in this one. */
  dropped: z.array(z.object({ proofNumber: z.number().int(), frameName: z.string(), viewTitle: z.string().nullable() })),
});
export type PickListDetail = z.infer<typeof PickListDetail>;

export const PickListLine = PickListDetail.omit({ picks: true, dropped: true });
export type PickListLine = z.infer<typeof PickListLine>;

export const pickListOperations: Operation[] = [
  {
    method: 'get',
    path: '/api/commissions/{commissionId}/pick-lists',
    summary: 'The pick lists sent for a commission, newest first',
    who: 'staff',
    answer: z.object({ items: z.array(PickListLine) }),
  },
  { method: 'get', path: '/api/pick-lists/{pickListId}', summary: 'A pick list with its picks', who: 'staff', answer: PickListDetail },
  { method: 'get', path: '/api/pick-lists/{pickListId}/csv', summary: 'The list as CSV (RFC 4180)', who: 'staff', answer: 'text/csv' },
  {
    method: 'get',
    path: '/api/pick-lists/{pickListId}/names',
    summary: 'The file names alone, for a search box',
    who: 'staff',
    answer: 'text/plain',
  },
];
