import { z } from 'zod';
import type { Operation } from './operation.ts';
import { Exposures, SheetStateName, WriteToGuests } from './sheets.ts';
import { Uses } from './uses.ts';

export const Role = z.enum(['lead', 'reviewer']);

/** What a guest sees of a sheet besides its pictures. Money in minor units of `currency`. */
export const GuestSheet = z.object({
  id: z.uuid(),
  number: z.number().int(),
  /** How many sheets of this commission were issued. */
  of: z.number().int(),
  studio: z.object({ name: z.string(), replyTo: z.string(), timeZone: z.string() }),
  commission: z.object({ title: z.string(), client: z.string() }),
  state: SheetStateName,
  issuedAt: z.iso.datetime().nullable(),
  /** "2026-11-17", the last day to choose. */
  chooseBy: z.string().nullable(),
  endsAt: z.iso.datetime().nullable(),
  allowance: z.number().int(),
  extraPrice: z.number().int(),
  currency: z.string(),
  proofCount: z.number().int(),
  /** Counts up when the proofs change: then ask for them again. */
  revision: z.number().int(),
  /** Of somebody who looks by the open link: no account yet, so an id of the looking itself, and neither name nor address. */
  me: z.object({
    accountId: z.uuid(),
    name: z.string(),
    email: z.string(),
    role: z.enum([...Role.options, 'looker']),
    shortcuts: z.boolean(),
  }),
  /** For somebody who looks by the open link, initials stand in the place of names. */
  people: z.array(z.object({ accountId: z.uuid(), name: z.string(), initials: z.string(), role: Role })),
  reopened: z.object({ at: z.iso.datetime(), reason: z.string() }).nullable(),
  lastPickList: z
    .object({ number: z.number().int(), sentAt: z.iso.datetime(), sentBy: z.string(), picks: z.number().int(), extras: z.number().int() })
    .nullable(),
  /** What a picture may be wanted for; whether it is good for it is worked out in the browser. */
  uses: Uses,
  /** ask: give a name and confirm an address, to mark from then on. */
  can: z.object({ mark: z.boolean(), ask: z.boolean(), send: z.boolean(), invite: z.boolean() }),
});
export type GuestSheet = z.infer<typeof GuestSheet>;

export const GuestProof = z.object({
  id: z.uuid(),
  number: z.number().int(),
  /** null: the last storey, "Also made". */
  viewId: z.uuid().nullable(),
  /** Pixels of the original, upright. */
  width: z.number().int(),
  height: z.number().int(),
  /** ThumbHash in base64. */
  placeholder: z.string().nullable(),
  /** Addresses of the watermarked pictures, longest side 480, 960 and 2560 px; null while they are being made. */
  pictures: z.object({ small: z.string(), medium: z.string(), large: z.string() }).nullable(),
  asShot: z.object({
    fNumber: z.number().nullable(),
    /** Seconds. */
    exposureTime: z.number().nullable(),
    iso: z.number().nullable(),
    /** Millimetres. */
    focalLength: z.number().nullable(),
    /** The camera's wall clock without zone. */
    takenLocal: z.string().nullable(),
    /** The shortest and the longest time of a bracket, in seconds; null for a single frame. */
    shutterRange: z.object({ fastest: z.number(), slowest: z.number() }).nullable(),
    /** "2 stops apart"; null for a single frame, or where the settings of one are not known. */
    apart: z.string().nullable(),
  }),
  /** Null for a single frame. */
  exposures: Exposures.nullable(),
});
export type GuestProof = z.infer<typeof GuestProof>;

/** The proofs in the order of the sheet: storey by storey, and within a storey as the studio laid them. The same for every guest. */
export const GuestProofs = z.object({
  revision: z.number().int(),
  storeys: z.array(z.object({ viewId: z.uuid().nullable(), title: z.string(), askedFor: z.string() })),
  proofs: z.array(GuestProof),
});
export type GuestProofs = z.infer<typeof GuestProofs>;

/** Who marked what. A proof with a lead's mark is a pick. */
export const SheetMarks = z.object({ marks: z.array(z.object({ proofId: z.uuid(), accountId: z.uuid() })) });
export type SheetMarks = z.infer<typeof SheetMarks>;

export const MarkAnswer = z.object({ proofId: z.uuid(), marked: z.boolean() });
export type MarkAnswer = z.infer<typeof MarkAnswer>;

/** `proofIds` are the picks as the lead saw them: where somebody changed them meanwhile, nothing is sent. */
export const SendPickList = z.object({
  proofIds: z.array(z.uuid()).min(1, 'Nothing is picked yet.').max(5000),
  words: z.string().trim().max(4000, 'At most 4000 characters.').default(''),
});
export type SendPickList = z.infer<typeof SendPickList>;

export const SentPickList = z.object({
  number: z.number().int(),
  sentAt: z.iso.datetime(),
  sentBy: z.string(),
  words: z.string(),
  picks: z.number().int(),
  allowance: z.number().int(),
  extras: z.number().int(),
  extraPrice: z.number().int(),
  currency: z.string(),
  proofIds: z.array(z.uuid()),
});
export type SentPickList = z.infer<typeof SentPickList>;

export const InviteReviewer = z.object({
  name: z.string().trim().min(1, 'Write the name.').max(120),
  email: z.string().trim().toLowerCase().pipe(z.email('This is no e-mail address.').max(254)),
  words: WriteToGuests.shape.words,
});
export type InviteReviewer = z.infer<typeof InviteReviewer>;

/** The sheet as its guests will see it, for the studio. */
export const SheetPreview = z.object({ sheet: GuestSheet, proofs: GuestProofs });
export type SheetPreview = z.infer<typeof SheetPreview>;

const sheet = '/api/guest/sheets/{sheetId}';

export const guestSheetOperations: Operation[] = [
  { method: 'get', path: '/api/sheets/{sheetId}/preview', summary: 'The sheet as its guests see it', who: 'staff', answer: SheetPreview },
  { method: 'get', path: sheet, summary: 'A sheet as its guest sees it', who: 'looker', answer: GuestSheet },
  { method: 'get', path: `${sheet}/proofs`, summary: 'The proofs of the sheet', who: 'looker', answer: GuestProofs },
  { method: 'get', path: `${sheet}/marks`, summary: 'Who marked what', who: 'looker', answer: SheetMarks },
  {
    method: 'get',
    path: `${sheet}/events`,
    summary: 'Changes as they happen (server-sent events)',
    who: 'looker',
    answer: 'text/event-stream',
  },
  { method: 'put', path: `${sheet}/proofs/{proofId}/mark`, summary: 'Mark a proof', who: 'guest-of-sheet', answer: MarkAnswer },
  { method: 'delete', path: `${sheet}/proofs/{proofId}/mark`, summary: 'Take one’s mark away', who: 'guest-of-sheet', answer: MarkAnswer },
  {
    method: 'get',
    path: `${sheet}/pick-lists`,
    summary: 'What was sent to the studio',
    who: 'guest-of-sheet',
    answer: z.object({ items: z.array(SentPickList) }),
  },
  {
    method: 'post',
    path: `${sheet}/pick-lists`,
    summary: 'Send the picks to the studio',
    who: 'lead',
    body: SendPickList,
    answer: SentPickList,
    status: 201,
  },
  {
    method: 'post',
    path: `${sheet}/guests`,
    summary: 'Invite a reviewer',
    who: 'lead',
    body: InviteReviewer,
    answer: GuestSheet,
    status: 201,
  },
];
