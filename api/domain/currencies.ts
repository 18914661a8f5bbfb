/** The number of minor-unit digits of every currency that does not have two (ISO 4217, list one of 2024-06-25). */
const DIGITS: Record<number, string> = {
  0: 'BIF CLP DJF GNF ISK JPY KMF KRW PYG RWF UGX UYI VND VUV XAF XOF XPF',
  3: 'BHD IQD JOD KWD LYD OMR TND',
  4: 'CLF UYW',
};

const EXPONENTS = new Map<string, number>(
  Object.entries(DIGITS).flatMap(([digits, codes]) => codes.split(' ').map((code) => [code, Number(digits)] as const)),
);

/** True for three capital letters, the shape of an ISO 4217 code. Whether the code is in the list is not checked. */
export function looksLikeCurrency(code: string): boolean {
  return /^[A-Z]{3}$/.test(code);
}

/**
 * Digits after the point of a currency, from ISO 4217. Intl is not asked: ICU follows what people write (it gives 0 for
 * HUF and IQD), while amounts are stored in the standard's minor units.
 * @throws RangeError where the code is not three capital letters
 */
export function currencyExponent(code: string): number {
  if (!looksLikeCurrency(code)) throw new RangeError(`"${code}" is not a currency code.`);
  return EXPONENTS.get(code) ?? 2;
}
