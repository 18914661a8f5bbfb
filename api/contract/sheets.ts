import { z } from 'zod';
import type { Operation } from './operation.ts';
import { StudioOpenLink } from './studio-open-link.ts';
import { Watermark } from './watermark.ts';

const Day = z.iso.date('Write the day as year-month-day.');
const FrameIds = z.array(z.uuid()).min(1, 'Choose at least one frame.').max(1000, 'At most 1000 frames at once.');
const ProofIds = z.array(z.uuid()).min(1).max(5000);
const Words = z.string().trim().max(4000, 'At most 4000 characters.');
const Email = z.string().trim().toLowerCase().pipe(z.email('This is no e-mail address.').max(254));
const PersonName = z.string().trim().min(1, 'Write the name.').max(120, 'At most 120 characters.');

export const SheetStateName = z.enum(['Draft', 'Open', 'Sent', 'Ended']);

/** A sheet as a line of the Proofs page. Money in minor units of `currency`. */
export const SheetSummary = z.object({
  id: z.uuid(),
  commissionId: z.uuid(),
  number: z.number().int(),
  state: SheetStateName,
  chooseBy: z.string().nullable(),
  endsAt: z.iso.datetime().nullable(),
  issuedAt: z.iso.datetime().nullable(),
  sentAt: z.iso.datetime().nullable(),
  withdrawnAt: z.iso.datetime().nullable(),
  allowance: z.number().int(),
  extraPrice: z.number().int(),
  currency: z.string(),
  proofCount: z.number().int(),
  /** Proofs whose pictures carry the sheet's watermark already. */
  proofsReady: z.number().int(),
  pickCount: z.number().int(),
  guestCount: z.number().int(),
  version: z.number().int(),
});
export type SheetSummary = z.infer<typeof SheetSummary>;

/** What a bracket's proof is made of. */
export const Exposures = z.object({
  /** Frames of the bracket. */
  count: z.number().int(),
  /** The picture is fused from them; else it is the lead frame alone. */
  merged: z.boolean(),
  /** "5 exposures merged". */
  says: z.string(),
});
export type Exposures = z.infer<typeof Exposures>;

export const StudioProof = z.object({
  id: z.uuid(),
  number: z.number().int(),
  frameId: z.uuid(),
  frameName: z.string(),
  /** The bracket it stands for; `frameId` is then the bracket's lead. */
  bracketId: z.uuid().nullable(),
  /** Null for a single frame. */
  exposures: Exposures.nullable(),
  viewId: z.uuid().nullable(),
  width: z.number().int(),
  height: z.number().int(),
  placeholder: z.string().nullable(),
  ready: z.boolean(),
  /** Addresses of the pictures without watermark, of the frame or of the merged bracket. */
  pictures: z.object({ small: z.string(), medium: z.string() }),
  markedBy: z.array(z.string()),
  picked: z.boolean(),
});
export type StudioProof = z.infer<typeof StudioProof>;

export const SheetGuestRow = z.object({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  role: z.enum(['lead', 'reviewer']),
  invitedAt: z.iso.datetime(),
  firstOpenedAt: z.iso.datetime().nullable(),
  lastSeenAt: z.iso.datetime().nullable(),
  remindedAt: z.iso.datetime().nullable(),
  withdrawnAt: z.iso.datetime().nullable(),
  /** Came by the open link and confirmed an address; nobody named them. */
  byOpenLink: z.boolean(),
  marks: z.number().int(),
  /** State of the newest mail to this guest about this sheet. */
  mail: z.enum(['waiting', 'handing-over', 'sent', 'failed', 'unsure', 'withdrawn']).nullable(),
});
export type SheetGuestRow = z.infer<typeof SheetGuestRow>;

export const StudioSheet = SheetSummary.extend({
  watermark: Watermark,
  reopenedAt: z.iso.datetime().nullable(),
  reopenReason: z.string().nullable(),
  proofs: z.array(StudioProof),
  guests: z.array(SheetGuestRow),
  /** Null while it is switched off. */
  openLink: StudioOpenLink.nullable(),
  can: z.object({
    edit: z.boolean(),
    issue: z.boolean(),
    invite: z.boolean(),
    withdraw: z.boolean(),
    reopen: z.boolean(),
    remove: z.boolean(),
    price: z.boolean(),
    /** Switch the open link on, or change it. */
    openLink: z.boolean(),
  }),
});
export type StudioSheet = z.infer<typeof StudioSheet>;

export const MakeSheet = z.object({ frameIds: FrameIds });
export type MakeSheet = z.infer<typeof MakeSheet>;

/** A missing field means "leave". */
export const ChangeSheet = z.object({
  chooseBy: Day.nullable().optional(),
  allowance: z.number().int().min(0).max(10_000).optional(),
  extraPrice: z.number().int().min(0).max(100_000_000_000).optional(),
  watermark: Watermark.optional(),
});
export type ChangeSheet = z.infer<typeof ChangeSheet>;

export const AddProofs = z.object({ frameIds: FrameIds });
export type AddProofs = z.infer<typeof AddProofs>;
export const TakeProofs = z.object({ proofIds: ProofIds });
export type TakeProofs = z.infer<typeof TakeProofs>;
/** Every proof of the sheet, in the order wanted. */
export const OrderProofs = z.object({ proofIds: ProofIds });
export type OrderProofs = z.infer<typeof OrderProofs>;
/** null hangs the proofs under no view: "Also made". */
export const HangProofs = z.object({ proofIds: ProofIds, viewId: z.uuid().nullable() });
export type HangProofs = z.infer<typeof HangProofs>;

export const InviteGuest = z.object({ name: PersonName, email: Email, role: z.enum(['lead', 'reviewer']) });
export type InviteGuest = z.infer<typeof InviteGuest>;
export const InviteGuests = z.object({
  guests: z.array(InviteGuest).min(1, 'Name at least one person.').max(50),
  words: Words.default(''),
});
export type InviteGuests = z.infer<typeof InviteGuests>;
export const WriteToGuests = z.object({ words: Words.default('') });
export type WriteToGuests = z.infer<typeof WriteToGuests>;
export const ReopenSheet = z.object({
  reason: z.string().trim().min(1, 'Say why, so that your client knows.').max(2000),
  chooseBy: Day.optional(),
});
export type ReopenSheet = z.infer<typeof ReopenSheet>;

const sheet = '/api/sheets/{sheetId}';

export const sheetOperations: Operation[] = [
  {
    method: 'get',
    path: '/api/commissions/{commissionId}/sheets',
    summary: 'The proof sheets of a commission',
    who: 'staff',
    answer: z.object({ items: z.array(SheetSummary) }),
  },
  {
    method: 'post',
    path: '/api/commissions/{commissionId}/sheets',
    summary: 'Make a proof sheet from chosen frames',
    who: 'staff',
    body: MakeSheet,
    answer: StudioSheet,
    status: 201,
  },
  { method: 'get', path: sheet, summary: 'A proof sheet with its proofs and guests', who: 'staff', answer: StudioSheet },
  {
    method: 'patch',
    path: sheet,
    summary: 'Change last date, allowance, price or watermark',
    who: 'staff',
    ifMatch: true,
    body: ChangeSheet,
    answer: StudioSheet,
  },
  { method: 'delete', path: sheet, summary: 'Remove a draft', who: 'staff', status: 204 },
  { method: 'post', path: `${sheet}/proofs`, summary: 'Put more frames on the sheet', who: 'staff', body: AddProofs, answer: StudioSheet },
  { method: 'post', path: `${sheet}/take-off`, summary: 'Take proofs off the sheet', who: 'staff', body: TakeProofs, answer: StudioSheet },
  { method: 'put', path: `${sheet}/order`, summary: 'Put the proofs in order', who: 'staff', body: OrderProofs, answer: StudioSheet },
  { method: 'post', path: `${sheet}/hang`, summary: 'Hang proofs under a view', who: 'staff', body: HangProofs, answer: StudioSheet },
  {
    method: 'post',
    path: `${sheet}/issue`,
    summary: 'Open the sheet and invite people',
    who: 'staff',
    body: InviteGuests,
    answer: StudioSheet,
  },
  { method: 'post', path: `${sheet}/guests`, summary: 'Invite more people', who: 'staff', body: InviteGuests, answer: StudioSheet },
  {
    method: 'post',
    path: `${sheet}/guests/{guestId}/send-again`,
    summary: 'Send a new link',
    who: 'staff',
    body: WriteToGuests,
    answer: StudioSheet,
  },
  { method: 'post', path: `${sheet}/guests/{guestId}/withdraw`, summary: 'Take a link back', who: 'staff', answer: StudioSheet },
  { method: 'post', path: `${sheet}/guests/{guestId}/restore`, summary: 'Let a guest in again', who: 'staff', answer: StudioSheet },
  {
    method: 'post',
    path: `${sheet}/remind`,
    summary: 'Remind the guests of the last date',
    who: 'staff',
    body: WriteToGuests,
    answer: StudioSheet,
  },
  { method: 'post', path: `${sheet}/withdraw`, summary: 'Take the whole sheet back', who: 'staff', answer: StudioSheet },
  { method: 'post', path: `${sheet}/restore`, summary: 'Put a sheet back before its guests', who: 'staff', answer: StudioSheet },
  {
    method: 'post',
    path: `${sheet}/reopen`,
    summary: 'Reopen a sheet that was sent or has ended',
    who: 'staff',
    body: ReopenSheet,
    answer: StudioSheet,
  },
];
