import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import { announce } from '../../db/live.ts';
import { formatByteSize } from '../../domain/byte-size.ts';
import type { ByteRange } from '../../domain/byte-ranges.ts';
import type { GuestActor } from '../../middleware/actor.ts';
import type { Delivery } from '../../models/Delivery.ts';
import { DeliveryRecipient } from '../../models/DeliveryRecipient.ts';
import { Download } from '../../models/Download.ts';
import { addToRecord } from '../record/add-to-record.ts';
import type { TransferWatch } from './send-object.ts';

/** What is fetched, by whom, of which delivery. */
export interface Fetching {
  actor: GuestActor;
  recipient: DeliveryRecipient;
  delivery: Delivery;
  what: 'file' | 'web' | 'full';
  deliveryFileId: string | null;
  size: number;
  /** As the record calls it: "“East front.tif”", "everything in web size". */
  called: string;
}

/** A request from the first byte on, so soon after the last one, is the same person trying again. */
const SAME_TRY_MINUTES = 10;
/** A process that dies leaves at most so much of a transfer unwritten. */
const WRITE_EVERY_MS = 10_000;

/**
 * Writes a transfer down. The rule: a request goes on with the person's latest unfinished download of the same thing when
 * it begins behind the first byte, or when that download was last heard of within ten minutes; any other request begins a
 * new one. A download is finished when its pieces cover the file, in whatever order they came, so that five tries of a
 * download manager are one download. What is counted are bytes handed to the connection.
 */
export function trackDownload(ctx: Context, fetching: Fetching): TransferWatch {
  let downloadId = '';
  let pieces: ByteRange[] = [];
  let writtenAt = Date.now();
  const write = async () => {
    const now = pieces;
    pieces = [];
    writtenAt = Date.now();
    if (downloadId && now.length > 0) await cover(ctx, fetching, downloadId, now);
  };
  const quietly = (work: Promise<void>) =>
    work.catch((error: unknown) => ctx.log.error({ err: error, downloadId }, 'a download could not be written down'));
  return {
    begin: async (ranges) => {
      downloadId = await beginOrGoOn(ctx, fetching, ranges);
    },
    sent: (piece) => {
      const last = pieces.at(-1);
      if (last && last.end + 1 === piece.start) last.end = piece.end;
      else pieces.push({ ...piece });
      if (Date.now() - writtenAt > WRITE_EVERY_MS) void quietly(write());
    },
    end: () => quietly(write()),
  };
}

async function beginOrGoOn(ctx: Context, fetching: Fetching, ranges: readonly ByteRange[]): Promise<string> {
  const { delivery, recipient, what, deliveryFileId } = fetching;
  const same = { deliveryId: delivery.id, accountId: recipient.accountId, what, deliveryFileId };
  return ctx.knex.transaction(async (trx) => {
    // Two connections of one download manager wait for each other here, or each would begin a download of its own.
    await DeliveryRecipient.query(trx).findById(recipient.id).forUpdate();
    const open = await Download.within(delivery, trx).where(same).whereNull('finishedAt').orderBy('startedAt', 'desc').first();
    const goesOn = ranges.every((range) => range.start > 0) || (open && Date.now() - open.lastAt.getTime() < SAME_TRY_MINUTES * 60_000);
    if (open && goesOn) {
      await Download.query(trx).findById(open.id).patch({ lastAt: new Date() });
      return open.id;
    }
    const begun = await Download.query(trx)
      .insert({ studioId: delivery.studioId, ...same, sizeBytes: fetching.size })
      .returning('*');
    await tell(trx, fetching, 'download.began', `Began to fetch ${fetching.called}, ${formatByteSize(fetching.size)}`);
    return begun.id;
  });
}

async function cover(ctx: Context, fetching: Fetching, downloadId: string, pieces: readonly ByteRange[]): Promise<void> {
  const ranges = `{${pieces.map(({ start, end }) => `[${start},${end + 1})`).join(',')}}`;
  await ctx.knex.transaction(async (trx) => {
    const { rows } = await trx.raw<{ rows: { finished: boolean }[] }>(
      `with before as (select id, finished_at from downloads where id = :id for update)
       update downloads d
          set covered = d.covered + :ranges::int8multirange,
              sent_bytes = (select coalesce(sum(upper(r) - lower(r)), 0) from unnest(d.covered + :ranges::int8multirange) r),
              last_at = now(),
              finished_at = coalesce(d.finished_at, case when d.covered + :ranges::int8multirange @> int8range(0, d.size_bytes) then now() end)
         from before where d.id = before.id
       returning before.finished_at is null and d.finished_at is not null as finished`,
      { id: downloadId, ranges },
    );
    if (rows[0]?.finished) await tell(trx, fetching, 'download.finished', `Fetched ${fetching.called}, ${formatByteSize(fetching.size)}`);
    await announce(trx, `commission:${fetching.delivery.commissionId}`, { what: 'downloads-changed', deliveryId: fetching.delivery.id });
  });
}

async function tell(trx: Transaction, fetching: Fetching, did: `download.${string}`, says: string): Promise<void> {
  const { delivery, recipient, actor, what, deliveryFileId, size } = fetching;
  await addToRecord(trx, {
    studioId: delivery.studioId,
    commissionId: delivery.commissionId,
    // The name the studio gave, never the account's own.
    actor: { kind: 'guest', accountId: actor.accountId, name: recipient.name },
    did,
    says: `${says} (delivery ${delivery.number})`,
    about: { deliveryId: delivery.id, what, fileId: deliveryFileId, bytes: size },
  });
}
