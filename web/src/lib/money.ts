import { formatMoney } from '../../../api/domain/money.ts';

/** "£85": an amount in minor units of a currency, as the reader's pages show it. */
export function formatPrice(minor: number, currency: string): string {
  return formatMoney({ minor, currency });
}
