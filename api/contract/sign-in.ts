import { z } from 'zod';
import type { Operation } from './operation.ts';
import { Asked } from './guests.ts';
import { EmailAddress, LinkToken, NameLine } from './person.ts';
import { TimeZone } from './time-zone.ts';

export const PASSWORD_LENGTH = { least: 12, most: 128 } as const;

/**
 * A new password: 12 to 128 characters of any kind, counted in code points and neither trimmed nor cut. Brought into Unicode's
 * form NFC, since keyboards differ in how they write the same letter.
 */
export const NewPassword = z
  .string()
  .max(1024, 'At most 128 characters.')
  .transform((password) => password.normalize('NFC'))
  .refine((password) => [...password].length >= PASSWORD_LENGTH.least, 'At least 12 characters.')
  .refine((password) => [...password].length <= PASSWORD_LENGTH.most, 'At most 128 characters.');

/** A password to be compared: whatever was typed. */
const TypedPassword = z
  .string()
  .min(1, 'Write your password.')
  .max(1024, 'At most 128 characters.')
  .transform((password) => password.normalize('NFC'));

export const SignUp = z.object({
  studioName: NameLine,
  name: NameLine,
  email: EmailAddress,
  password: NewPassword,
  /** The browser's own; the studio's dates are meant in it until the settings say otherwise. */
  timeZone: TimeZone.optional(),
});
export type SignUp = z.infer<typeof SignUp>;

export const SignIn = z.object({ email: EmailAddress, password: TypedPassword });
export type SignIn = z.infer<typeof SignIn>;

export const AskPasswordReset = z.object({ email: EmailAddress });
export type AskPasswordReset = z.infer<typeof AskPasswordReset>;

export const LookAtLink = z.object({ token: LinkToken });
export type LookAtLink = z.infer<typeof LookAtLink>;

export const PasswordResetLink = z.object({ email: z.string() });
export type PasswordResetLink = z.infer<typeof PasswordResetLink>;
export const FinishPasswordReset = z.object({ token: LinkToken, password: NewPassword });
export type FinishPasswordReset = z.infer<typeof FinishPasswordReset>;

export const ConfirmEmailLink = z.object({ email: z.string(), studioName: z.string() });
export type ConfirmEmailLink = z.infer<typeof ConfirmEmailLink>;
/** The link proves the address, the password that the person at the link is the one who signed up. */
export const ConfirmEmail = z.object({ token: LinkToken, password: TypedPassword });
export type ConfirmEmail = z.infer<typeof ConfirmEmail>;

export const JoinLink = z.object({
  studioName: z.string(),
  email: z.string(),
  name: z.string(),
  /** new: choose one; known: the account has one already, type it. */
  password: z.enum(['new', 'known']),
});
export type JoinLink = z.infer<typeof JoinLink>;
/** The password is checked as a new one where the account has none yet. */
export const JoinStudio = z.object({ token: LinkToken, name: NameLine, password: TypedPassword });
export type JoinStudio = z.infer<typeof JoinStudio>;

export const ChangePassword = z.object({ current: TypedPassword, password: NewPassword });
export type ChangePassword = z.infer<typeof ChangePassword>;

/** A missing field means "leave". */
export const ChangeMe = z.object({ name: NameLine.optional(), shortcuts: z.boolean().optional() });
export type ChangeMe = z.infer<typeof ChangeMe>;

/** Who works at this browser, for which studio, and what they may do there. */
export const Me = z.object({
  account: z.object({ id: z.uuid(), name: z.string(), email: z.string(), shortcuts: z.boolean() }),
  studio: z.object({ id: z.uuid(), name: z.string(), replyTo: z.string(), timeZone: z.string(), currency: z.string() }),
  role: z.enum(['owner', 'assistant']),
  can: z.object({
    /** Name, addresses, zone and currency of the studio. */
    changeStudio: z.boolean(),
    team: z.boolean(),
    money: z.boolean(),
    deleteCommissions: z.boolean(),
    leave: z.boolean(),
  }),
  /** The page of the mail catcher, where mails of a demo end up; null on real services. */
  mailsPage: z.string().nullable(),
});
export type Me = z.infer<typeof Me>;

export const signInOperations: Operation[] = [
  {
    method: 'post',
    path: '/api/sign-up',
    summary: 'Create a studio and its owner; a mail asks to confirm the address',
    who: 'anyone',
    body: SignUp,
    answer: Asked,
    status: 202,
  },
  { method: 'post', path: '/api/sign-in', summary: 'Begin a session of the studio', who: 'anyone', body: SignIn, answer: Me },
  { method: 'post', path: '/api/sign-out', summary: 'End the session of this browser', who: 'anyone', status: 204 },
  { method: 'post', path: '/api/sign-out-everywhere', summary: 'End every session of this account', who: 'staff', status: 204 },
  { method: 'get', path: '/api/me', summary: 'Who works here, and what they may do', who: 'staff', answer: Me },
  { method: 'patch', path: '/api/me', summary: 'Change the own name or shortcuts', who: 'staff', body: ChangeMe, answer: Me },
  {
    method: 'put',
    path: '/api/me/password',
    summary: 'Change the password; ends the other sessions',
    who: 'staff',
    body: ChangePassword,
    status: 204,
  },
  {
    method: 'post',
    path: '/api/password-resets',
    summary: 'Ask for a mail with a link to choose a new password',
    who: 'anyone',
    body: AskPasswordReset,
    answer: Asked,
    status: 202,
  },
  {
    method: 'post',
    path: '/api/password-resets/look',
    summary: 'Whether a reset link still works, and for whom',
    who: 'anyone',
    body: LookAtLink,
    answer: PasswordResetLink,
  },
  {
    method: 'post',
    path: '/api/password-resets/finish',
    summary: 'Choose a new password; ends every session',
    who: 'anyone',
    body: FinishPasswordReset,
    status: 204,
  },
  {
    method: 'post',
    path: '/api/confirm-email/look',
    summary: 'Whether a confirmation link still works, and for whom',
    who: 'anyone',
    body: LookAtLink,
    answer: ConfirmEmailLink,
  },
  {
    method: 'post',
    path: '/api/confirm-email/again',
    summary: 'Ask for a new confirmation link in place of one that has ended',
    who: 'anyone',
    body: LookAtLink,
    answer: Asked,
    status: 202,
  },
  {
    method: 'post',
    path: '/api/confirm-email',
    summary: 'Confirm the address of a sign-up and begin a session',
    who: 'anyone',
    body: ConfirmEmail,
    answer: Me,
  },
  {
    method: 'post',
    path: '/api/join/look',
    summary: 'Whether an invitation into a studio still works, and what it needs',
    who: 'anyone',
    body: LookAtLink,
    answer: JoinLink,
  },
  { method: 'post', path: '/api/join', summary: 'Join a studio and begin a session', who: 'anyone', body: JoinStudio, answer: Me },
];
