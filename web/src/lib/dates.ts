const LOCALE = 'en-GB';
const formats = new Map<string, Intl.DateTimeFormat>();

function format(options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = JSON.stringify(options);
  let found = formats.get(key);
  if (!found) {
    found = new Intl.DateTimeFormat(LOCALE, options);
    formats.set(key, found);
  }
  return found;
}

type Time = string | number | Date;

/** True for a date without a time, as a due date is: it names a day wherever one stands. */
function isPlainDay(value: Time): value is string {
  return typeof value === 'string' && /^\d{4}-\d{2}-\d{2}$/.test(value);
}

function read(value: Time): Date {
  return new Date(isPlainDay(value) ? `${value}T00:00:00Z` : value);
}

/** "3 Nov 2026". A plain "2026-11-03" names that day in every zone; a time is shown in `timeZone`, else in the reader's. */
export function formatDay(value: Time, timeZone?: string): string {
  const zone = isPlainDay(value) ? 'UTC' : timeZone;
  const parts = format({ day: 'numeric', month: 'short', year: 'numeric', timeZone: zone }).formatToParts(read(value));
  return parts.map((part) => (part.type === 'month' ? part.value.slice(0, 3) : part.value)).join('');
}

/** "3 Nov 2026, 17:06" in `timeZone`, else in the reader's zone. */
export function formatTime(value: Time, timeZone?: string): string {
  return `${formatDay(value, timeZone)}, ${formatClock(value, timeZone)}`;
}

/** "17:06" in `timeZone`, else in the reader's zone. */
export function formatClock(value: Time, timeZone?: string): string {
  return format({ hour: '2-digit', minute: '2-digit', hourCycle: 'h23', timeZone }).format(read(value));
}

/** "28 Oct 2026, 17:06" from a camera's wall clock ("2026-10-28T17:06:12"), which names no zone and is shown as it was set. */
export function formatWallClock(value: string): string {
  return formatTime(`${value.replace(/(Z|[+-]\d{2}:?\d{2})$/, '')}Z`, 'UTC');
}

/** "17 Nov 2026, 23:59 GMT": for a last moment, where the zone matters. */
export function formatTimeWithZone(value: Time, timeZone?: string): string {
  const parts = format({ hour: '2-digit', timeZone, timeZoneName: 'short' }).formatToParts(read(value));
  return `${formatTime(value, timeZone)} ${parts.find((part) => part.type === 'timeZoneName')?.value ?? ''}`.trim();
}

const STEPS: [Intl.RelativeTimeFormatUnit, number][] = [
  ['minute', 60],
  ['hour', 3600],
  ['day', 86_400],
];

/** "2 hours ago", "in 4 days", "tomorrow"; beyond two weeks the day itself. */
export function formatAge(value: Time, now: Date = new Date()): string {
  const seconds = (read(value).getTime() - now.getTime()) / 1000;
  const size = Math.abs(seconds);
  if (size < 60) return 'just now';
  if (size > 14 * 86_400) return formatDay(value);
  const [unit, length] = STEPS.findLast(([, least]) => size >= least) ?? ['minute', 60];
  return new Intl.RelativeTimeFormat(LOCALE, { numeric: 'auto' }).format(Math.round(seconds / length), unit);
}

/** Whole days from now to a moment, rounded up; 0 or less when it has passed. */
export function daysLeft(value: Time, now: Date = new Date()): number {
  // Adding 0 turns the -0 of a day that has just passed into a plain 0.
  return Math.ceil((read(value).getTime() - now.getTime()) / 86_400_000) + 0;
}
