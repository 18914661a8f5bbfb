import { currencyExponent } from './currencies.ts';

/** An amount in minor units (pence, cents) of one currency. `minor` is a safe integer. */
export interface Money {
  minor: number;
  currency: string;
}

function safe(value: bigint): number {
  const number = Number(value);
  if (!Number.isSafeInteger(number)) throw new RangeError('The amount is too large.');
  return number;
}

/**
 * numerator / denominator, rounded to a whole number with the half away from zero (a refund rounds as its charge did).
 * Exact at any size: no floating point is involved, so 1.005 never becomes 1.00.
 */
export function divideHalfUp(numerator: bigint, denominator: bigint): bigint {
  if (denominator <= 0n) throw new RangeError('The denominator must be positive.');
  const magnitude = numerator < 0n ? -numerator : numerator;
  const rounded = (2n * magnitude + denominator) / (2n * denominator);
  return numerator < 0n ? -rounded : rounded;
}

/** A share of an amount, the rate in hundredths of a percent (20% is 2000), rounded half up to a minor unit. */
export function shareOf(minor: number, basisPoints: number): number {
  return safe(divideHalfUp(BigInt(minor) * BigInt(basisPoints), 10_000n));
}

/** The share contained in a gross amount: 20% within 120.00 is 20.00. Rate in hundredths of a percent. */
export function shareWithin(grossMinor: number, basisPoints: number): number {
  return safe(divideHalfUp(BigInt(grossMinor) * BigInt(basisPoints), 10_000n + BigInt(basisPoints)));
}

/** `count` times an amount. */
export function timesMoney(minor: number, count: number): number {
  return safe(BigInt(minor) * BigInt(count));
}

/** The amount as a decimal numeral with a point, for machines: 8550 GBP is "85.50", 5 JPY is "5", 1234 KWD is "1.234". */
export function moneyAsDecimal({ minor, currency }: Money): string {
  const digits = currencyExponent(currency);
  const sign = minor < 0 ? '-' : '';
  const padded = BigInt(Math.abs(minor))
    .toString()
    .padStart(digits + 1, '0');
  return digits === 0 ? sign + padded : `${sign}${padded.slice(0, -digits)}.${padded.slice(-digits)}`;
}

/**
 * Reads what a person typed ("85", "85.5", "1 200,00") into minor units. One point or comma is the decimal sign; spaces,
 * thin spaces and apostrophes group. Null where it is no amount, has more digits than the currency knows, or is ambiguous
 * ("1,200" in a currency of two digits has a group of three after the comma: asked again rather than guessed).
 */
export function parseMoney(text: string, currency: string): number | null {
  const digits = currencyExponent(currency);
  const match = /^(\d{1,12})(?:[.,](\d{1,4}))?$/.exec(text.trim().replace(/[\s\u00a0\u2009\u202f'’]/g, ''));
  if (!match?.[1]) return null;
  const fraction = match[2] ?? '';
  if (fraction.length > digits) return null;
  return safe(BigInt(match[1] + fraction.padEnd(digits, '0')));
}

/**
 * The amount for people, e.g. £85, £85.50, ¥5,000. Whole amounts lose their zeros unless `exact` asks for them.
 * Digits come from ISO 4217, never from Intl.
 */
export function formatMoney(money: Money, options: { locale?: string; exact?: boolean } = {}): string {
  const digits = currencyExponent(money.currency);
  const whole = money.minor % 10 ** digits === 0;
  const shown = whole && !options.exact ? 0 : digits;
  const format = new Intl.NumberFormat(options.locale ?? 'en-GB', {
    style: 'currency',
    currency: money.currency,
    minimumFractionDigits: shown,
    maximumFractionDigits: shown,
  });
  // A numeral, not a number: the nearest double of a large amount prints wrong pence.
  return format.format(moneyAsDecimal(money) as `${number}`);
}
