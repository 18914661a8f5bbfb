import { z } from 'zod';
import type { Operation } from './operation.ts';
import { Limit } from './paging.ts';

/** What the lines of the record are about. */
export const RECORD_NOUNS = [
  'studio',
  'team',
  'client',
  'commission',
  'frame',
  'sheet',
  'guest',
  'pick-list',
  'final',
  'delivery',
  'download',
  'mail',
] as const;
export const RecordNoun = z.enum(RECORD_NOUNS);
export type RecordNoun = z.infer<typeof RecordNoun>;

export const RecordLine = z.object({
  id: z.number().int(),
  at: z.iso.datetime(),
  by: z.object({ name: z.string(), kind: z.enum(['staff', 'guest', 'oriel']) }),
  noun: RecordNoun,
  /** As "noun.verb". */
  did: z.string(),
  says: z.string(),
});
export type RecordLine = z.infer<typeof RecordLine>;

export const RecordPage = z.object({ items: z.array(RecordLine), next: z.string().nullable() });
export type RecordPage = z.infer<typeof RecordPage>;

export const ListRecord = z.object({
  noun: RecordNoun.optional(),
  after: z.string().max(2000).optional(),
  limit: Limit,
});
export type ListRecord = z.infer<typeof ListRecord>;

export const recordOperations: Operation[] = [
  {
    method: 'get',
    path: '/api/commissions/{commissionId}/record',
    summary: 'What was done by whom, newest first',
    who: 'staff',
    query: ListRecord,
    answer: RecordPage,
  },
];
