import { z } from 'zod';

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

/** A zone of the IANA time zone database by name, "Europe/London". Offsets ("+01:00") know no summer time and are refused. */
export const TimeZone = z
  .string()
  .max(64)
  .refine((name) => /^[A-Za-z]/.test(name) && isTimeZone(name), 'This is no time zone.');
