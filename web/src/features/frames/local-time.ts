import { formatClock, formatDay } from '../../lib/dates.ts';

/**
 * A camera's wall clock is shown as it stands: it has no zone, so it is read and written in one and the same.
 * @param local "2026-10-28T17:06:12.34"
 */
function instant(local: string): Date {
  return new Date(`${local.slice(0, 19)}Z`);
}

/** "28 Oct 2026" */
export function formatLocalDay(local: string): string {
  return formatDay(instant(local), 'UTC');
}

/** "28 Oct 2026, 17:06:12.34": the frames of a bracket differ in the last digits only. */
export function formatLocalTime(local: string): string {
  return `${formatLocalDay(local)}, ${formatClock(instant(local), 'UTC')}${local.slice(16)}`;
}
