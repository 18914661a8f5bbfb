import currencyCodes from 'currency-codes';
import type { Currency } from '../../contract/studios.ts';

/** Funds codes of ISO 4217: units of account that nobody pays in. */
const FUNDS = new Set('BOV CHE CHW CLF COU MXV USN UYI UYW'.split(' '));

let list: Currency[] | undefined;

/**
 * The currencies of ISO 4217's list one that somebody can be charged in, by code. Codes with X belong to no country: metals, bond
 * units and tests among them are left out, the currencies that several countries share are kept.
 */
export function chargeable(): Currency[] {
  list ??= currencyCodes.data
    .filter(({ code, countries }) => !FUNDS.has(code) && (!code.startsWith('X') || countries.length > 1))
    .map(({ code, currency, digits }) => ({ code, name: currency, digits }))
    .sort((a, b) => (a.code < b.code ? -1 : 1));
  return list;
}
