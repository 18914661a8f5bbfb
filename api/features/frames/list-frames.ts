import type { QueryBuilder } from 'objection';
import type { Context } from '../../context.ts';
import type { FrameList, FrameQuery, FrameSort } from '../../contract/frames.ts';
import { keyOf, pageOf } from '../../db/page.ts';
import type { StudioScope } from '../../db/scope.ts';
import { behindCursor } from '../../middleware/forged-cursor.ts';
import { Frame } from '../../models/Frame.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { RESTORABLE_DAYS } from './restore-frames.ts';
import { type CheckedFrame, LEAN_MEASURES, thresholdsOf } from './frame-checks.ts';
import { presentFrameItem } from './presenter.ts';

/** The column of each order and its type: keys travel as text, which loses neither microseconds nor digits. */
const ORDERS: Record<FrameSort, [column: string, type: string]> = {
  taken: ['taken_local', 'timestamp'],
  name: ['name', 'text'],
  added: ['created_at', 'timestamptz'],
  'f-number': ['f_number', 'float8'],
  'exposure-time': ['exposure_time', 'float8'],
  iso: ['iso', 'integer'],
  'focal-length': ['focal_length', 'float8'],
};

type Rows = QueryBuilder<Frame, Frame[]>;
type Row = CheckedFrame & { sortKey: string | null };

function filter(rows: Rows, input: FrameQuery): void {
  if (input.deleted === 'only') {
    rows.whereRaw(`deleted_at > now() - make_interval(days => ?)`, RESTORABLE_DAYS);
  } else {
    rows.whereNull('deletedAt');
  }
  if (input.view === 'none') rows.whereNull('viewId');
  else if (input.view) rows.where({ viewId: input.view });
  if (input.hidden === 'only') rows.whereNotNull('hiddenAt');
  if (input.hidden === 'without') rows.whereNull('hiddenAt');
  if (input.state) rows.where({ state: input.state });
  if (input.text) rows.where('name', 'ilike', `%${input.text.replace(/[\\%_]/g, '\\$&')}%`);
}

/** Goes on behind the last row of the page before. What is unknown stands last in both directions; names and ids settle ties. */
function goOn(rows: Rows, [column, type]: [string, string], order: 'asc' | 'desc', after: (string | number | null)[]): void {
  const [key = null, name = '', id = ''] = after;
  if (key === null) return void rows.whereRaw(`${column} is null and (name, id) > (?, ?::uuid)`, [name ?? '', id ?? '']);
  const sign = order === 'asc' ? '>' : '<';
  rows.whereRaw(`(${column} ${sign} ?::${type} or (${column} = ?::${type} and (name, id) > (?, ?::uuid)) or ${column} is null)`, [
    key,
    key,
    name ?? '',
    id ?? '',
  ]);
}

/** A page of a commission's frames. */
export async function listFrames(ctx: Context, scope: StudioScope, commissionId: string, input: FrameQuery): Promise<FrameList> {
  const commission = await findCommission(scope, commissionId);
  const order = ORDERS[input.sort];
  const rows = Frame.within(scope)
    .where({ commissionId: commission.id })
    .select('frames.*', ctx.knex.raw(`${order[0]}::text as "sortKey"`), ctx.knex.raw(LEAN_MEASURES))
    .orderByRaw(`${order[0]} ${input.order} nulls last, name, id`)
    .limit(input.limit + 1);
  filter(rows, input);
  const after = keyOf(input.after, 3);
  if (after) goOn(rows, order, input.order, after);
  const page = pageOf((await behindCursor(rows)) as Row[], input.limit, (row) => [row.sortKey, row.name, row.id]);
  const thresholds = await thresholdsOf(scope);
  return { items: await Promise.all(page.items.map((frame) => presentFrameItem(ctx, frame, thresholds))), next: page.next };
}
