import currencyCodes from 'currency-codes';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { currencyExponent } from '../../api/domain/currencies.ts';
import { divideHalfUp, formatMoney, moneyAsDecimal, parseMoney, shareOf, shareWithin, timesMoney } from '../../api/domain/money.ts';

describe('minor units (ISO 4217, list of 2024-06-25 as npm currency-codes 2.2.0 carries it)', () => {
  it('agrees on every code that is a currency', () => {
    const funds = /^(X|BOV|CHE|CHW|COU|CLF|MXV|USN|UYI|UYW|ZWL)/; // Funds, metals and test codes have no digits in the list.
    const codes = currencyCodes.codes().filter((code) => !funds.test(code) || /^(XAF|XOF|XPF|XCD|CLF|UYI|UYW)$/.test(code));
    expect(codes.length).toBeGreaterThan(150);
    for (const code of codes) expect([code, currencyExponent(code)]).toEqual([code, currencyCodes.code(code)?.digits]);
  });

  it('does not follow ICU, which gives HUF and IQD no digits', () => {
    expect(currencyExponent('HUF')).toBe(2);
    expect(currencyExponent('IQD')).toBe(3);
  });

  it('refuses what is no code', () => {
    expect(() => currencyExponent('pounds')).toThrow(RangeError);
  });
});

describe('rounding half up (HMRC VATREC12030: below half a penny down, half or more up)', () => {
  // Rows computed by hand with decimals: amount in minor units, rate in basis points, share.
  it.each([
    [70488, 2000, 14098],
    [1250, 2100, 263],
    [5, 1000, 1],
    [250, 500, 13],
    [9999, 2000, 2000],
  ])('%i at %i basis points is %i', (amount, rate, share) => {
    expect(shareOf(amount, rate)).toBe(share);
    expect(shareOf(-amount, rate)).toBe(-share);
  });

  it.each([
    [10000, 2100, 1736],
    [10000, 2000, 1667],
    [12000, 2000, 2000],
    [11900, 1900, 1900],
    [4999, 2000, 833],
    [100000, 2500, 20000],
  ])('%i contains a share of %i basis points: %i', (gross, rate, share) => {
    expect(shareWithin(gross, rate)).toBe(share);
  });

  it('is never further than half a unit from the exact value', () => {
    fc.assert(
      fc.property(fc.bigInt({ min: -(10n ** 18n), max: 10n ** 18n }), fc.bigInt({ min: 1n, max: 10n ** 9n }), (n, d) => {
        const off = 2n * (divideHalfUp(n, d) * d - n);
        expect(off <= d && off >= -d).toBe(true);
      }),
    );
  });

  it('refuses amounts that a number cannot hold exactly', () => {
    expect(() => timesMoney(Number.MAX_SAFE_INTEGER, 2)).toThrow(RangeError);
  });
});

describe('amounts for people and machines', () => {
  it.each([
    [8500, 'GBP', '£85', '£85.00'],
    [8550, 'GBP', '£85.50', '£85.50'],
    [-5, 'GBP', '-£0.05', '-£0.05'],
    [162000, 'GBP', '£1,620', '£1,620.00'],
    [5000, 'JPY', 'JP¥5,000', 'JP¥5,000'],
    [1234, 'KWD', 'KWD 1.234', 'KWD 1.234'],
    [100050, 'HUF', 'HUF 1,000.50', 'HUF 1,000.50'],
    [900719925474099, 'EUR', '€9,007,199,254,740.99', '€9,007,199,254,740.99'],
  ])('%i %s is %s', (minor, currency, short, exact) => {
    const plain = (text: string) => text.replace(/\u00a0/g, ' ');
    expect(plain(formatMoney({ minor, currency }))).toBe(short);
    expect(plain(formatMoney({ minor, currency }, { exact: true }))).toBe(exact);
  });

  it('reads back every amount it writes', () => {
    const currencies = fc.constantFrom('GBP', 'JPY', 'KWD', 'CLF');
    fc.assert(
      fc.property(fc.nat(10 ** 9), currencies, (minor, currency) => {
        expect(parseMoney(moneyAsDecimal({ minor, currency }), currency)).toBe(minor);
      }),
    );
  });

  // The first three are floating point's known traps: 1.005 * 100, 4.35 * 100 and 1.15 * 100 all fall short.
  it.each([
    ['1.005', 'KWD', 1005],
    ['4.35', 'GBP', 435],
    ['1.15', 'GBP', 115],
    ['85', 'GBP', 8500],
    ['85.5', 'GBP', 8550],
    [' 1 200,00 ', 'EUR', 120000],
    ['1,200', 'GBP', null],
    ['1.005', 'GBP', null],
    ['5.0', 'JPY', null],
    ['-3', 'GBP', null],
    ['1e3', 'GBP', null],
    ['', 'GBP', null],
    ['ten', 'GBP', null],
  ])('reads "%s" in %s as %s', (text, currency, minor) => {
    expect(parseMoney(text, currency)).toBe(minor);
  });
});
