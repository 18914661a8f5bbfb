import { z } from 'zod';
import { AddCommission, type CommissionDetail } from '../../../../api/contract/commissions.ts';
import { currencyExponent, looksLikeCurrency } from '../../../../api/domain/currencies.ts';
import { formatMoney, moneyAsDecimal, parseMoney } from '../../../../api/domain/money.ts';
import { formatDay } from '../../lib/dates.ts';
import type { Difference } from '../../ui/changed-meanwhile.tsx';

/** An empty date field means that there is no date. */
const day = (schema: z.ZodType<string | null, string | null>) =>
  z
    .string()
    .trim()
    .transform((typed) => typed || null)
    .pipe(schema);

/** What the form of a commission holds; rules and sentences are the contract's. */
export const CommissionFields = z
  .object({
    title: AddCommission.shape.title,
    brief: AddCommission.shape.brief.removeDefault(),
    shotOn: day(AddCommission.shape.shotOn.removeDefault()),
    dueOn: day(AddCommission.shape.dueOn.removeDefault()),
    allowance: z
      .string()
      .trim()
      .regex(/^\d{1,5}$/, 'Write a whole number.')
      .transform(Number)
      .pipe(AddCommission.shape.allowance.removeDefault()),
    price: z.string().trim(),
    currency: z.string().trim().toUpperCase(),
  })
  .transform(({ price, ...fields }, check) => {
    const extraPrice = looksLikeCurrency(fields.currency) ? parseMoney(price || '0', fields.currency) : 0;
    if (!looksLikeCurrency(fields.currency)) {
      check.addIssue({ code: 'custom', path: ['currency'], message: 'Write the currency as three letters, such as GBP.' });
    }
    if (extraPrice === null) {
      const example = currencyExponent(fields.currency) === 0 ? '85' : '85 or 85.50';
      check.addIssue({ code: 'custom', path: ['price'], message: `Write an amount in ${fields.currency}, such as ${example}.` });
    }
    return { ...fields, extraPrice: extraPrice ?? 0 };
  });
export type TypedFields = z.input<typeof CommissionFields>;
export type CommissionValues = z.output<typeof CommissionFields>;

/** Fills the form from a commission. */
export function fieldsOf(commission: CommissionDetail): TypedFields {
  const { title, brief, shotOn, dueOn, allowance, extraPrice, currency } = commission;
  const price = extraPrice === 0 ? '' : moneyAsDecimal({ minor: extraPrice, currency });
  return { title, brief, shotOn: shotOn ?? '', dueOn: dueOn ?? '', allowance: String(allowance), price, currency };
}

const show = (value: unknown) => (typeof value === 'string' && value ? formatDay(value) : '');

/** Where a newer version of a commission says something else than what is typed. */
export function differencesOf(newer: CommissionDetail, typed: TypedFields): Difference[] {
  const now = fieldsOf(newer);
  const money = (fields: TypedFields) => {
    const minor = looksLikeCurrency(fields.currency) ? parseMoney(fields.price || '0', fields.currency) : null;
    return minor === null ? fields.price : formatMoney({ minor, currency: fields.currency });
  };
  return [
    { label: 'Title', now: now.title, typed: typed.title },
    { label: 'Brief', now: now.brief, typed: typed.brief },
    { label: 'Shoot date', now: show(now.shotOn), typed: show(typed.shotOn) },
    { label: 'Due date', now: show(now.dueOn), typed: show(typed.dueOn) },
    { label: 'Allowance', now: now.allowance, typed: typed.allowance },
    { label: 'Price of an extra', now: money(now), typed: money(typed) },
  ].filter((each) => each.now !== each.typed);
}
