import { z } from 'zod';
import { OpenedLink } from './guests.ts';
import type { Operation } from './operation.ts';
import { EmailAddress, LinkToken, NameLine } from './person.ts';
import { StudioSheet } from './sheets.ts';

const LONGEST_PASSPHRASE = 200;

/** Characters that a keyboard gives; kept in the one form that all keyboards' ways of writing an accent come to. */
const Passphrase = z
  .string()
  .min(8, 'At least 8 characters.')
  .max(LONGEST_PASSPHRASE, `At most ${LONGEST_PASSPHRASE} characters.`)
  .refine((words) => !/\p{Cc}/u.test(words), 'A passphrase is one line without control characters.');

/** What a link asks for and how long it lasts. A missing field means "leave", null means "clear": no passphrase; ends with the sheet. */
export const OpenLinkTerms = z.object({
  passphrase: Passphrase.nullable().optional(),
  /** The last day, in the studio's time zone; not after the sheet's. */
  endsOn: z.iso.date('Write the day as year-month-day.').nullable().optional(),
});
export type OpenLinkTerms = z.infer<typeof OpenLinkTerms>;

/** Without `passphrase`, or with an empty one, nothing is tried: the answer says whether one is asked for. */
export const Look = z.object({
  token: LinkToken,
  passphrase: z.string().max(LONGEST_PASSPHRASE, 'No passphrase is as long as that.').optional(),
});
export type Look = z.infer<typeof Look>;

/** `goTo` is "/sheets/<id>", or null where the link asks for its passphrase first. */
export const LookAnswer = z.object({ goTo: z.string().nullable(), studio: z.string() });
export type LookAnswer = z.infer<typeof LookAnswer>;

export const AskToMark = z.object({ name: NameLine, email: EmailAddress });
export type AskToMark = z.infer<typeof AskToMark>;

/** The same whether the address is known or not. */
export const AskedToMark = z.object({ says: z.string() });
export type AskedToMark = z.infer<typeof AskedToMark>;

export const BeginMarking = z.object({ token: LinkToken });
export type BeginMarking = z.infer<typeof BeginMarking>;

const ofSheet = '/api/sheets/{sheetId}/open-link';

export const openLinkOperations: Operation[] = [
  { method: 'post', path: ofSheet, summary: 'Switch the open link on', who: 'staff', body: OpenLinkTerms, answer: StudioSheet },
  {
    method: 'patch',
    path: ofSheet,
    summary: 'Set or clear the passphrase or the last day of the open link',
    who: 'staff',
    body: OpenLinkTerms,
    answer: StudioSheet,
  },
  {
    method: 'post',
    path: `${ofSheet}/withdraw`,
    summary: 'Withdraw the open link: whoever looks by it sees nothing more',
    who: 'staff',
    answer: StudioSheet,
  },
  { method: 'post', path: '/api/look', summary: 'Look at a sheet by its open link', who: 'anyone', body: Look, answer: LookAnswer },
  {
    method: 'post',
    path: '/api/guest/sheets/{sheetId}/ask-to-mark',
    summary: 'Give a name and an address to mark from then on: a link to confirm it is sent there',
    who: 'looker',
    body: AskToMark,
    answer: AskedToMark,
    status: 202,
  },
  {
    method: 'post',
    path: '/api/begin',
    summary: 'Confirm the address of somebody who looked: makes a reviewer of them and begins a guest session',
    who: 'anyone',
    body: BeginMarking,
    answer: OpenedLink,
  },
];
