import { z } from 'zod';
import type { Operation } from './operation.ts';
import { EmailAddress, NameLine } from './person.ts';
import { Uses } from './uses.ts';

export const DeliveryState = z.enum(['Preparing', 'Failed', 'Sent', 'Ended', 'Withdrawn']);
export type DeliveryState = z.infer<typeof DeliveryState>;

export const ArchiveState = z.object({
  kind: z.enum(['full', 'web', 'picks']),
  state: z.enum(['building', 'ready', 'failed']),
  /** One sentence, where it failed. */
  problem: z.string().nullable(),
  name: z.string(),
  files: z.number().int(),
  /** Bytes; null until it is known. */
  size: z.number().int().nullable(),
  /** Bytes written so far. */
  written: z.number().int(),
});
export type ArchiveState = z.infer<typeof ArchiveState>;

/** What one recipient has fetched of one thing, over all tries. */
export const FetchState = z.object({
  finished: z.boolean(),
  /** Most bytes that any try came to. */
  sent: z.number().int(),
  /** Tries; one that was broken off and continued counts once. */
  times: z.number().int(),
  lastAt: z.iso.datetime(),
});
export type FetchState = z.infer<typeof FetchState>;

export const RecipientItem = z.object({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  invitedAt: z.iso.datetime().nullable(),
  firstOpenedAt: z.iso.datetime().nullable(),
  lastSeenAt: z.iso.datetime().nullable(),
  withdrawnAt: z.iso.datetime().nullable(),
  /** State of the last mail with the link; null before the delivery is sent. */
  mail: z.string().nullable(),
  full: FetchState.nullable(),
  web: FetchState.nullable(),
  /** Single files, by the file's id. */
  files: z.record(z.uuid(), FetchState),
  /** How many of the files this person has whole, by themselves or with everything in full resolution. */
  filesFetched: z.number().int(),
});
export type RecipientItem = z.infer<typeof RecipientItem>;

export const DeliveryFileItem = z.object({
  id: z.uuid(),
  finalId: z.uuid(),
  finalVersionId: z.uuid(),
  versionNumber: z.number().int(),
  /** The name it is downloaded by. */
  name: z.string(),
  title: z.string(),
  mediaType: z.string(),
  /** Bytes. */
  size: z.number().int(),
  sha256: z.string(),
  /** Pixels, upright. */
  width: z.number().int(),
  height: z.number().int(),
  placeholder: z.string().nullable(),
  picture: z.string().nullable(),
});
export type DeliveryFileItem = z.infer<typeof DeliveryFileItem>;

/** A delivery as the studio sees it. */
export const StudioDelivery = z.object({
  id: z.uuid(),
  number: z.number().int(),
  state: DeliveryState,
  words: z.string(),
  /** The last day to fetch, in the studio's zone. */
  fetchBy: z.iso.date(),
  endsAt: z.iso.datetime(),
  createdAt: z.iso.datetime(),
  sentAt: z.iso.datetime().nullable(),
  withdrawnAt: z.iso.datetime().nullable(),
  version: z.number().int(),
  files: z.array(DeliveryFileItem),
  /** Bytes of the files. */
  bytes: z.number().int(),
  recipients: z.array(RecipientItem),
  archives: z.array(ArchiveState),
  can: z.object({ withdraw: z.boolean(), restore: z.boolean(), extend: z.boolean(), invite: z.boolean(), retry: z.boolean() }),
});
export type StudioDelivery = z.infer<typeof StudioDelivery>;

/** Somebody who may be meant as a recipient: a contact of the client, or a guest of a sheet. */
export const KnownPerson = z.object({ name: z.string(), email: z.string(), from: z.enum(['contact', 'guest', 'delivery']) });
export type KnownPerson = z.infer<typeof KnownPerson>;

export const DeliveryList = z.object({
  /** Newest first. */
  items: z.array(StudioDelivery),
  people: z.array(KnownPerson),
  /** Days between now and the last date that is proposed. */
  proposedFetchBy: z.iso.date(),
  can: z.object({ deliver: z.boolean() }),
});
export type DeliveryList = z.infer<typeof DeliveryList>;

export const Recipient = z.object({ name: NameLine, email: EmailAddress });
export type Recipient = z.infer<typeof Recipient>;

const Words = z.string().trim().max(4000, 'At most 4000 characters.');
const FetchBy = z.iso.date('Choose the last date.');

export const MakeDelivery = z.object({
  /** The versions to hand over, in the order they are shown; one of each final. */
  finalVersionIds: z.array(z.uuid()).min(1, 'Choose a final first.').max(2000, 'At most 2000 files in one delivery.'),
  recipients: z.array(Recipient).min(1, 'Name somebody who gets the files.').max(50, 'At most 50 people.'),
  fetchBy: FetchBy,
  words: Words.default(''),
  /** Made once for each intention: the same key makes one delivery, however often it is sent. */
  key: z.uuid(),
});
export type MakeDelivery = z.infer<typeof MakeDelivery>;

export const ChangeDelivery = z.object({ fetchBy: FetchBy });
export type ChangeDelivery = z.infer<typeof ChangeDelivery>;

export const AddRecipients = z.object({ recipients: MakeDelivery.shape.recipients });
export type AddRecipients = z.infer<typeof AddRecipients>;

/** What a recipient sees. After the last date only whom to ask: `state` is Ended and there are no files. */
export const GuestDelivery = z.object({
  id: z.uuid(),
  state: z.enum(['Sent', 'Ended']),
  number: z.number().int(),
  studio: z.object({ name: z.string(), replyTo: z.string(), timeZone: z.string() }),
  commission: z.string(),
  client: z.string(),
  recipient: z.string(),
  words: z.string(),
  sentAt: z.iso.datetime(),
  fetchBy: z.iso.date(),
  endsAt: z.iso.datetime(),
  /** What a picture may be wanted for; whether it is good for it is worked out in the browser. */
  uses: Uses,
  files: z.array(
    DeliveryFileItem.omit({ finalId: true, finalVersionId: true, versionNumber: true, picture: true }).extend({
      pictures: z.object({ '480': z.string(), '960': z.string(), '2560': z.string() }).nullable(),
      download: z.string(),
      /** This person has the whole file already. */
      fetched: z.boolean(),
    }),
  ),
  archives: z.array(
    z.object({
      kind: z.enum(['full', 'web']),
      files: z.number().int(),
      size: z.number().int(),
      sha256: z.string(),
      download: z.string(),
      fetched: z.boolean(),
    }),
  ),
});
export type GuestDelivery = z.infer<typeof GuestDelivery>;

const many = '/api/commissions/{commissionId}/deliveries';
const one = `${many}/{deliveryId}`;
const guest = '/api/deliveries/{deliveryId}';
const picks = '/api/pick-lists/{pickListId}/archive';

export const deliveryOperations: Operation[] = [
  {
    method: 'get',
    path: many,
    summary: 'The deliveries of a commission, and who may be meant as a recipient',
    who: 'staff',
    answer: DeliveryList,
  },
  {
    method: 'post',
    path: many,
    summary: 'Make a delivery: its archives are built, then its recipients get their mails',
    who: 'staff',
    body: MakeDelivery,
    answer: StudioDelivery,
    status: 201,
  },
  { method: 'get', path: one, summary: 'A delivery and what each recipient has fetched', who: 'staff', answer: StudioDelivery },
  {
    method: 'patch',
    path: one,
    summary: 'Change the last date',
    who: 'staff',
    body: ChangeDelivery,
    answer: StudioDelivery,
    ifMatch: true,
  },
  { method: 'post', path: `${one}/retry`, summary: 'Build what failed again', who: 'staff', answer: StudioDelivery },
  { method: 'post', path: `${one}/withdraw`, summary: 'Take a delivery back from everybody', who: 'staff', answer: StudioDelivery },
  { method: 'post', path: `${one}/restore`, summary: 'Give a withdrawn delivery back', who: 'staff', answer: StudioDelivery },
  { method: 'post', path: `${one}/recipients`, summary: 'Add recipients', who: 'staff', body: AddRecipients, answer: StudioDelivery },
  {
    method: 'post',
    path: `${one}/recipients/{recipientId}/send-again`,
    summary: 'Send a recipient a new link',
    who: 'staff',
    answer: StudioDelivery,
  },
  {
    method: 'post',
    path: `${one}/recipients/{recipientId}/withdraw`,
    summary: 'Take a delivery back from one recipient',
    who: 'staff',
    answer: StudioDelivery,
  },
  {
    method: 'post',
    path: `${one}/recipients/{recipientId}/restore`,
    summary: 'Give it back to one recipient',
    who: 'staff',
    answer: StudioDelivery,
  },
  { method: 'get', path: guest, summary: 'A delivery as its recipient sees it', who: 'recipient', answer: GuestDelivery },
  {
    method: 'get',
    path: `${guest}/files/{fileId}/download`,
    summary: 'One file in full resolution',
    who: 'recipient',
    answer: 'application/octet-stream',
  },
  {
    method: 'get',
    path: `${guest}/archives/{kind}/download`,
    summary: 'Everything, in full resolution or web size',
    who: 'recipient',
    answer: 'application/zip',
  },
];

export const archiveOperations: Operation[] = [
  {
    method: 'post',
    path: picks,
    summary: 'Build an archive of the picked originals, or find it',
    who: 'staff',
    answer: ArchiveState,
    status: 202,
  },
  { method: 'get', path: picks, summary: 'How far the archive of the picked originals is', who: 'staff', answer: ArchiveState },
  { method: 'get', path: `${picks}/download`, summary: 'The archive of the picked originals', who: 'staff', answer: 'application/zip' },
];
