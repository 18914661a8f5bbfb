import { z } from 'zod';

/** Control characters end header lines of mails and lines of logs, so no name may hold one. */
const hasControl = /\p{Cc}/u;

/** An e-mail address in lower case, at most 254 characters (RFC 5321 4.5.3.1.3 less its brackets). */
export const EmailAddress = z
  .string()
  .trim()
  .toLowerCase()
  .pipe(z.email('This is no e-mail address.').max(254, 'An e-mail address has at most 254 characters.'));

/** A line of text that names somebody or something. */
export const NameLine = z
  .string()
  .trim()
  .min(1, 'Write a name.')
  .max(120, 'At most 120 characters.')
  .refine((name) => !hasControl.test(name), 'A name is one line without control characters.');

/** The secret part of a link in a mail. What has another shape is answered as an unknown one. */
export const LinkToken = z.string().max(200);
