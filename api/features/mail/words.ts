import { createInstance } from 'i18next';
import english from './messages/en.json' with { type: 'json' };

const words = createInstance();

void words.init({
  lng: 'en',
  fallbackLng: 'en',
  resources: { en: { translation: english } },
  // The layout escapes what goes into HTML; the text part must not be escaped.
  interpolation: { escapeValue: false },
  initAsync: false,
  showSupportNotice: false,
});

/** The words of a mail by their key in messages/en.json. @throws Error where there is no such key: a mail must not go out with a key in it. */
export function t(key: string, values: Record<string, string | number> = {}): string {
  if (!words.exists(key, values)) throw new Error(`There are no words "${key}" for mails.`);
  return words.t(key, values);
}

/** "17 November 2026, 23:59 GMT" in the studio's zone. */
export function momentInWords(moment: Date, timeZone: string): string {
  const format = new Intl.DateTimeFormat('en-GB', {
    day: 'numeric',
    month: 'long',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
    timeZone,
    timeZoneName: 'short',
  });
  const parts = new Map(format.formatToParts(moment).map((part) => [part.type, part.value]));
  const part = (name: Intl.DateTimeFormatPartTypes) => parts.get(name) ?? '';
  return `${part('day')} ${part('month')} ${part('year')}, ${part('hour')}:${part('minute')} ${part('timeZoneName')}`;
}

/** "17 November 2026" for a plain day, "2026-11-17". */
export function dayInWords(day: string): string {
  const format = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' });
  return format.format(new Date(`${day}T00:00:00Z`));
}
