/** The validators of a representation: a strong entity tag with its quotes, and its time to the second. */
export interface Validators {
  etag: string;
  modified: Date;
}

/** What the conditions of a request come to (RFC 9110 §13.2.2, in its order). */
export type Verdict = 'send' | 'not-modified' | 'failed';

type Headers = Record<string, string | string[] | undefined>;

function header(headers: Headers, name: string): string | undefined {
  const value = headers[name];
  return Array.isArray(value) ? value.join(', ') : value;
}

/** Entity tags of a list; a comma may stand inside the quotes. */
function tags(list: string): string[] {
  return list.match(/(?:W\/)?"[^"]*"/g) ?? [];
}

function seconds(date: Date): number {
  return Math.floor(date.getTime() / 1000);
}

const ASCTIME = /^[A-Z][a-z]{2} [A-Z][a-z]{2} [ \d]\d [\d:]{8} \d{4}$/;

/** An HTTP date in whole seconds, in any of the three forms (§5.6.7); undefined where it is none, so that the condition is ignored. */
function dateSeconds(text: string | undefined): number | undefined {
  if (text === undefined) return undefined;
  const inZone = ASCTIME.test(text) ? `${text} GMT` : text;
  const time = inZone.endsWith(' GMT') ? Date.parse(inZone) : NaN;
  return Number.isNaN(time) ? undefined : Math.floor(time / 1000);
}

/** If-Match compares strongly (§13.1.1): a weak tag never matches. */
function preconditionFails(headers: Headers, { etag, modified }: Validators): boolean {
  const match = header(headers, 'if-match');
  if (match !== undefined) return match.trim() !== '*' && !tags(match).includes(etag);
  const since = dateSeconds(header(headers, 'if-unmodified-since'));
  return since !== undefined && seconds(modified) > since;
}

/** If-None-Match compares weakly (§13.1.2) and, where it is given, If-Modified-Since is ignored (§13.1.3). */
function isCurrent(headers: Headers, { etag, modified }: Validators): boolean {
  const none = header(headers, 'if-none-match');
  if (none !== undefined) return none.trim() === '*' || tags(none).some((tag) => tag.replace(/^W\//, '') === etag);
  const since = dateSeconds(header(headers, 'if-modified-since'));
  return since !== undefined && seconds(modified) <= since;
}

/** Evaluates the conditions of a GET or HEAD. */
export function judgeConditions(headers: Headers, validators: Validators): Verdict {
  if (preconditionFails(headers, validators)) return 'failed';
  return isCurrent(headers, validators) ? 'not-modified' : 'send';
}

/**
 * Whether Range still counts (§13.1.5): without If-Range always; with a tag only where it is strong and the same; with a
 * date only where it is exactly Last-Modified.
 */
export function rangeHolds(headers: Headers, { etag, modified }: Validators): boolean {
  const condition = header(headers, 'if-range');
  if (condition === undefined) return true;
  if (condition.includes('"')) return condition.trim() === etag;
  return dateSeconds(condition) === seconds(modified);
}
