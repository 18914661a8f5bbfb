import { z } from 'zod';
import type { Operation } from './operation.ts';

export const UploadPurpose = z.enum(['frame', 'final']);
export type UploadPurpose = z.infer<typeof UploadPurpose>;

/** What the browser says of a file before it sends a byte. */
export const NewUpload = z.object({
  purpose: UploadPurpose,
  /** As the file is called where it comes from; it is cleaned, and kept as it is as text. */
  name: z.string().min(1, 'The file has no name.').max(1000, 'The name of the file is too long.'),
  /** Bytes. */
  size: z.number().int().positive('The file is empty.'),
  /** Of the whole file, 64 small hexadecimal digits. */
  sha256: z.string().regex(/^[0-9a-f]{64}$/, 'The SHA-256 has 64 hexadecimal digits.'),
  lastModified: z.iso.datetime({ offset: true }).optional(),
});
export type NewUpload = z.infer<typeof NewUpload>;

/**
 * `receiving`: parts are awaited; `checking`: all are there, the file is being taken in; `done`: it has become a frame or a
 * final; `failed`: it was refused, `problem` says why; `cancelled`: given up.
 */
export const UploadState = z.enum(['receiving', 'checking', 'done', 'failed', 'cancelled']);
export type UploadState = z.infer<typeof UploadState>;

export const Upload = z.object({
  id: z.uuid(),
  commissionId: z.uuid(),
  purpose: UploadPurpose,
  state: UploadState,
  /** Cleaned. */
  name: z.string(),
  /** As it came. */
  originalName: z.string(),
  /** Bytes. */
  size: z.number().int(),
  sha256: z.string(),
  /** Bytes of every part but the last. */
  partSize: z.number().int(),
  /** Parts are numbered from 1 to this. */
  partCount: z.number().int(),
  /** Numbers of the parts that the store holds; empty unless `receiving`. */
  partsThere: z.array(z.number().int()),
  /** One sentence for the person who brought the file, where it failed. */
  problem: z.string().nullable(),
  /** The frame it became. */
  frameId: z.uuid().nullable(),
  createdAt: z.iso.datetime(),
});
export type Upload = z.infer<typeof Upload>;

/** The file is in the commission already; nothing has to be sent. */
export const KnownFile = z.object({
  state: z.literal('known'),
  frameId: z.uuid().nullable(),
  finalId: z.uuid().nullable(),
  /** What it is called in the commission. */
  name: z.string(),
});
export type KnownFile = z.infer<typeof KnownFile>;

/** 201 with a new upload, 200 with one that goes on or with a file that is known. */
export const UploadStart = z.union([Upload, KnownFile]);
export type UploadStart = z.infer<typeof UploadStart>;

export const UploadQuery = z.object({
  after: z.string().optional(),
  limit: z.coerce.number().int().min(1).max(1000).default(200),
  state: UploadState.optional(),
  purpose: UploadPurpose.optional(),
});
export type UploadQuery = z.infer<typeof UploadQuery>;

/** Without `partsThere`, which only the single upload tells. */
export const UploadItem = Upload.omit({ partsThere: true });
export type UploadItem = z.infer<typeof UploadItem>;

/** Newest first; the limits stand beside, so that a page can tell a file that is too large before it is read. */
export const UploadList = z.object({
  items: z.array(UploadItem),
  next: z.string().nullable(),
  limits: z.object({ fileBytes: z.number(), pixels: z.number(), partSize: z.number() }),
});
export type UploadList = z.infer<typeof UploadList>;

export const PartReceipt = z.object({ number: z.number().int(), size: z.number().int() });
export type PartReceipt = z.infer<typeof PartReceipt>;

export const uploadOperations: Operation[] = [
  {
    method: 'post',
    path: '/api/commissions/{commissionId}/uploads',
    summary: 'Begin an upload, or go on with an unfinished one of the same file',
    who: 'staff',
    body: NewUpload,
    answer: UploadStart,
    status: 201,
  },
  {
    method: 'get',
    path: '/api/commissions/{commissionId}/uploads',
    summary: 'Uploads of a commission, newest first',
    who: 'staff',
    query: UploadQuery,
    answer: UploadList,
  },
  { method: 'get', path: '/api/uploads/{uploadId}', summary: 'An upload and the parts that are there', who: 'staff', answer: Upload },
  {
    method: 'put',
    path: '/api/uploads/{uploadId}/parts/{number}',
    summary: 'Send one part; sending it again does no harm',
    who: 'staff',
    file: 'part',
    answer: PartReceipt,
  },
  {
    method: 'post',
    path: '/api/uploads/{uploadId}/complete',
    summary: 'All parts are sent: check the file and take it in',
    who: 'staff',
    answer: Upload,
  },
  { method: 'delete', path: '/api/uploads/{uploadId}', summary: 'Give an unfinished upload up', who: 'staff', status: 204 },
];
