/** When an exposure was made, as far as its camera said so. */
export interface TakenTime {
  /** The camera's wall clock, "2026-10-28T17:06:12.34". */
  takenLocal: string | null;
  /** Minutes east of UTC. */
  takenOffsetMinutes: number | null;
  /** The instant, "2026-10-28T16:06:12.34Z"; known only with the offset. */
  takenAt: string | null;
}

const DATE_TIME = /^(\d{4})[:\-/](\d\d)[:\-/](\d\d)[ T](\d\d):(\d\d):(\d\d)/;
const OFFSET = /^([+-])(\d\d):(\d\d)$/;

/** Digits of a fraction of a second: "34" is 0.34 s, " 5 " is 0.5 s (CIPA DC-008, SubSecTime). At most six are kept. */
function fraction(subSeconds: string): string {
  const digits = /^\d+/.exec(subSeconds.trim())?.[0].slice(0, 6).replace(/0+$/, '');
  return digits ? `.${digits}` : '';
}

/** Minutes east of UTC of "+01:00"; null for blanks, which stand for "unknown", and for what no zone has. */
export function parseOffset(text: string): number | null {
  if (text.trim() === 'Z') return 0;
  const [, sign, hours, minutes] = OFFSET.exec(text.trim()) ?? [];
  if (!sign) return null;
  const total = Number(hours) * 60 + Number(minutes);
  if (Number(minutes) > 59 || total > 14 * 60) return null;
  return sign === '-' ? -total : total;
}

/** "2026:10:28 17:06:12" as "2026-10-28T17:06:12"; null for blanks, zeros and days that no calendar has. */
export function parseWallClock(text: string): string | null {
  const parts = DATE_TIME.exec(text.trim());
  if (!parts) return null;
  const [, year, month, day, hour, minute, second] = parts;
  const written = `${year}-${month}-${day}T${hour}:${minute}:${second}`;
  const instant = new Date(`${written}Z`);
  const exists = !Number.isNaN(instant.getTime()) && instant.toISOString().startsWith(written) && Number(year) >= 1826;
  return exists ? written : null;
}

/** Brings date, fraction and offset of one EXIF time together. */
export function takenTime(dateTime: string, subSeconds: string, offset: string): TakenTime {
  const wallClock = parseWallClock(dateTime);
  if (wallClock === null) return { takenLocal: null, takenOffsetMinutes: null, takenAt: null };
  const minutes = parseOffset(offset);
  const parts = fraction(subSeconds);
  const at = minutes === null ? null : new Date(Date.parse(`${wallClock}Z`) - minutes * 60_000).toISOString();
  return { takenLocal: wallClock + parts, takenOffsetMinutes: minutes, takenAt: at && at.replace(/\.\d+Z$/, `${parts}Z`) };
}
