import type { Context } from '../../context.ts';
import type { UploadList, UploadQuery } from '../../contract/uploads.ts';
import { momentKeyOf, momentText } from '../../db/moment-key.ts';
import { pageOf } from '../../db/page.ts';
import type { StudioScope } from '../../db/scope.ts';
import { Upload } from '../../models/Upload.ts';
import { findCommission } from '../commissions/find-commission.ts';
import { presentUploadItem } from './presenter.ts';
import { partSizeFor } from './upload-parts.ts';

/** A page of a commission's uploads, newest first. */
export async function listUploads(ctx: Context, scope: StudioScope, commissionId: string, input: UploadQuery): Promise<UploadList> {
  const commission = await findCommission(scope, commissionId);
  const query = Upload.within(scope)
    .where({ commissionId: commission.id })
    .select('uploads.*', ctx.knex.raw(`${momentText('created_at')} as "createdKey"`))
    .orderBy([
      { column: 'createdAt', order: 'desc' },
      { column: 'id', order: 'desc' },
    ])
    .limit(input.limit + 1);
  if (input.state) query.where({ state: input.state });
  if (input.purpose) query.where({ purpose: input.purpose });
  const after = momentKeyOf(input.after);
  if (after) query.whereRaw('(created_at, id) < (?::timestamptz, ?::uuid)', [after.moment, after.id]);
  const rows = (await query) as (Upload & { createdKey: string })[];
  const page = pageOf(rows, input.limit, (row) => [row.createdKey, row.id]);
  const { fileBytes, pixels } = ctx.config.limits;
  return { items: page.items.map(presentUploadItem), next: page.next, limits: { fileBytes, pixels, partSize: partSizeFor(0) } };
}
