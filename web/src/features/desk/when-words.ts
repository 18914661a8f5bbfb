import type { DeskWhen } from '../../../../api/contract/desk.ts';
import { daysLeft, formatAge, formatDay } from '../../lib/dates.ts';

const DAY = 86_400_000;

/** Whole days from the reader's today to a plain day. */
function daysTo(day: string, now: Date): number {
  const today = Date.UTC(now.getFullYear(), now.getMonth(), now.getDate());
  return Math.round((Date.parse(`${day}T00:00:00Z`) - today) / DAY);
}

function dayWords(day: string, now: Date): string {
  const days = daysTo(day, now);
  if (days === 0) return 'today';
  if (days === 1) return 'tomorrow';
  return days > 1 && days <= 14 ? `in ${days} days` : formatDay(day);
}

/** "due tomorrow", "4 days left", "link ends 30 Dec 2026", "2 hours ago". */
export function whenWords(when: DeskWhen, now = new Date()): string {
  switch (when.kind) {
    case 'due': {
      const days = daysTo(when.at, now);
      if (days < 0) return days === -1 ? 'due yesterday' : `${-days} days overdue`;
      return `due ${dayWords(when.at, now)}`;
    }
    case 'shot':
      return `shoot ${dayWords(when.at, now)}`;
    case 'left': {
      const days = daysLeft(when.at, now);
      return days <= 1 ? 'ends within a day' : `${days} days left`;
    }
    case 'ends':
      return `link ends ${formatDay(when.at)}`;
    case 'ended':
      return `link ended ${formatDay(when.at)}`;
    default:
      return formatAge(when.at, now);
  }
}
