import { z } from 'zod';
import { COMMISSION_STATES } from '../domain/commission-state.ts';
import { AddClient } from './clients.ts';
import type { Operation } from './operation.ts';
import { Limit } from './paging.ts';

const Day = z.iso.date('Write the day as year-month-day.');
const Title = z.string().trim().min(1, 'Write a title.').max(200, 'At most 200 characters.');

export const CommissionStateName = z.enum(COMMISSION_STATES);

/** The one figure of each step. Counts leave out what was deleted. */
export const StepFigures = z.object({
  views: z.number().int(),
  frames: z.number().int(),
  /** On sheets that were not withdrawn. */
  proofs: z.number().int(),
  /** Of these, on sheets that were issued. */
  proofsOut: z.number().int(),
  /** Of each sheet's latest pick list. */
  picks: z.number().int(),
  extras: z.number().int(),
  /** Finished files, whatever their versions. */
  finals: z.number().int(),
  /** Picks that have their final. */
  ofPicks: z.number().int(),
  /** Deliveries that were sent and not withdrawn. */
  deliveries: z.number().int(),
  record: z.number().int(),
});
export type StepFigures = z.infer<typeof StepFigures>;

/** A commission with what its title block and steps show. Money in minor units of `currency`. */
export const CommissionDetail = z.object({
  id: z.uuid(),
  title: z.string(),
  brief: z.string(),
  client: z.object({ id: z.uuid(), name: z.string() }),
  /** "2026-10-28" */
  shotOn: z.string().nullable(),
  dueOn: z.string().nullable(),
  allowance: z.number().int(),
  extraPrice: z.number().int(),
  currency: z.string(),
  state: CommissionStateName,
  figures: StepFigures,
  closedAt: z.iso.datetime().nullable(),
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
  version: z.number().int(),
  can: z.object({ edit: z.boolean(), price: z.boolean(), close: z.boolean(), reopen: z.boolean(), remove: z.boolean() }),
});
export type CommissionDetail = z.infer<typeof CommissionDetail>;

/** A commission as a line of a list. */
export const CommissionSummary = z.object({
  id: z.uuid(),
  title: z.string(),
  client: z.object({ id: z.uuid(), name: z.string() }),
  shotOn: z.string().nullable(),
  dueOn: z.string().nullable(),
  state: CommissionStateName,
  frames: z.number().int(),
  picks: z.number().int(),
  finals: z.number().int(),
  createdAt: z.iso.datetime(),
  deletedAt: z.iso.datetime().nullable(),
});
export type CommissionSummary = z.infer<typeof CommissionSummary>;

export const CommissionPage = z.object({ items: z.array(CommissionSummary), next: z.string().nullable() });
export type CommissionPage = z.infer<typeof CommissionPage>;

export const ListCommissions = z.object({
  search: z.string().trim().max(200).optional(),
  state: CommissionStateName.optional(),
  clientId: z.uuid().optional(),
  sort: z.enum(['newest', 'due', 'title']).default('newest'),
  /** true: those deleted within the last 30 days, for the owner alone. */
  deleted: z.enum(['true', 'false']).default('false'),
  after: z.string().max(2000).optional(),
  limit: Limit,
});
export type ListCommissions = z.infer<typeof ListCommissions>;

export const AddView = z.object({
  title: z.string().trim().min(1, 'Say what the view shows.').max(200, 'At most 200 characters.'),
  askedFor: z.string().trim().max(2000, 'At most 2000 characters.').default(''),
});
export type AddView = z.infer<typeof AddView>;

const Allowance = z.number('Write a number.').int('Write a whole number.').min(0, 'Not below 0.').max(10_000, 'At most 10 000.');
const ExtraPrice = z.number('Write an amount.').int().min(0, 'Not below 0.').max(100_000_000_000, 'That is more than Oriel can count.');
const Currency = z
  .string()
  .trim()
  .toUpperCase()
  .pipe(z.string().regex(/^[A-Z]{3}$/, 'Write the currency as three letters, such as GBP.'));

/** Give either `clientId` or `client`, who is then added. `extraPrice` and `currency` are the owner's to set. */
export const AddCommission = z.object({
  title: Title,
  clientId: z.uuid('Choose the client.').optional(),
  client: AddClient.optional(),
  brief: z.string().trim().max(20_000, 'At most 20 000 characters.').default(''),
  shotOn: Day.nullable().default(null),
  dueOn: Day.nullable().default(null),
  allowance: Allowance.default(0),
  extraPrice: ExtraPrice.optional(),
  currency: Currency.optional(),
  views: z.array(AddView).max(200, 'At most 200 views.').default([]),
});
export type AddCommission = z.infer<typeof AddCommission>;

/** A missing field means "leave", null means "clear". */
export const ChangeCommission = z.object({
  title: Title.optional(),
  clientId: z.uuid('Choose the client.').optional(),
  brief: AddCommission.shape.brief.removeDefault().optional(),
  shotOn: Day.nullable().optional(),
  dueOn: Day.nullable().optional(),
  allowance: Allowance.optional(),
  extraPrice: ExtraPrice.optional(),
  currency: Currency.optional(),
});
export type ChangeCommission = z.infer<typeof ChangeCommission>;

/** What goes when a commission is deleted. */
export const CommissionContents = z.object({
  frames: z.number().int(),
  sheets: z.number().int(),
  pickLists: z.number().int(),
  finals: z.number().int(),
  deliveries: z.number().int(),
  /** Bytes of originals and finished files. */
  storedBytes: z.number().int(),
  /** Days in which it can be brought back. */
  undoDays: z.number().int(),
});
export type CommissionContents = z.infer<typeof CommissionContents>;

/** One picture the brief asks for. */
export const View = z.object({
  id: z.uuid(),
  title: z.string(),
  askedFor: z.string(),
  /** Frames hung under it. */
  frames: z.number().int(),
  /** Proofs hung under it on sheets. */
  proofs: z.number().int(),
  version: z.number().int(),
});
export type View = z.infer<typeof View>;

export const Views = z.object({ items: z.array(View) });
export type Views = z.infer<typeof Views>;

/** A missing field means "leave". */
export const ChangeView = z.object({
  title: AddView.shape.title.optional(),
  askedFor: AddView.shape.askedFor.removeDefault().optional(),
});
export type ChangeView = z.infer<typeof ChangeView>;

/** Every view of the commission, in the order wanted. */
export const OrderViews = z.object({ viewIds: z.array(z.uuid()).max(200) });
export type OrderViews = z.infer<typeof OrderViews>;

const commission = '/api/commissions/{commissionId}';

export const commissionOperations: Operation[] = [
  {
    method: 'get',
    path: '/api/commissions',
    summary: 'The studio’s commissions; search looks at titles and clients',
    who: 'staff',
    query: ListCommissions,
    answer: CommissionPage,
  },
  {
    method: 'post',
    path: '/api/commissions',
    summary: 'Begin a commission',
    who: 'staff',
    body: AddCommission,
    answer: CommissionDetail,
    status: 201,
  },
  { method: 'get', path: commission, summary: 'A commission with the figures of its steps', who: 'staff', answer: CommissionDetail },
  {
    method: 'patch',
    path: commission,
    summary: 'Change the brief, dates, allowance or price',
    who: 'staff',
    ifMatch: true,
    body: ChangeCommission,
    answer: CommissionDetail,
  },
  { method: 'post', path: `${commission}/close`, summary: 'Close a commission', who: 'staff', answer: CommissionDetail },
  { method: 'post', path: `${commission}/reopen`, summary: 'Reopen a closed commission', who: 'staff', answer: CommissionDetail },
  {
    method: 'get',
    path: `${commission}/contents`,
    summary: 'What goes when it is deleted',
    who: 'owner',
    answer: CommissionContents,
  },
  {
    method: 'delete',
    path: commission,
    summary: 'Delete a commission with all it holds; undone within 30 days',
    who: 'owner',
    status: 204,
  },
  { method: 'post', path: `${commission}/restore`, summary: 'Bring a deleted commission back', who: 'owner', answer: CommissionDetail },
];

export const viewOperations: Operation[] = [
  { method: 'get', path: `${commission}/views`, summary: 'The views of the brief, in order', who: 'staff', answer: Views },
  { method: 'post', path: `${commission}/views`, summary: 'Add a view', who: 'staff', body: AddView, answer: View, status: 201 },
  { method: 'put', path: `${commission}/views/order`, summary: 'Put the views in order', who: 'staff', body: OrderViews, answer: Views },
  {
    method: 'patch',
    path: `${commission}/views/{viewId}`,
    summary: 'Change a view',
    who: 'staff',
    ifMatch: true,
    body: ChangeView,
    answer: View,
  },
  {
    method: 'delete',
    path: `${commission}/views/{viewId}`,
    summary: 'Delete a view; what hung there moves to “Also made”',
    who: 'staff',
    status: 204,
  },
];
