import type { Transaction } from 'objection';
import type { Context } from '../../context.ts';
import type { MakeDelivery } from '../../contract/deliveries.ts';
import { announce } from '../../db/live.ts';
import { cleanFileName, distinctNames } from '../../domain/file-names.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid } from '../../middleware/problem.ts';
import type { Commission } from '../../models/Commission.ts';
import { Delivery } from '../../models/Delivery.ts';
import { DeliveryFile } from '../../models/DeliveryFile.ts';
import type { FinalVersion } from '../../models/FinalVersion.ts';
import { requestArchive } from '../archives/request-archive.ts';
import { lockOpenCommission } from '../commissions/find-commission.ts';
import { currentPicks } from '../finals/current-picks.ts';
import { loadFinals, titleOf, type LoadedFinal } from '../finals/load-finals.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { addRecipientRows } from './recipients.ts';
import { lastMoment } from './change-delivery.ts';

interface ChosenFile {
  version: FinalVersion;
  title: string;
}

/**
 * Makes a delivery of chosen finals to named people. Its archives go into the queue; its mails go out once they are
 * built. The same key makes one delivery, however often it is asked for.
 * @throws Problem 404, 409 where the commission is closed, 422
 */
export async function makeDelivery(ctx: Context, actor: StaffActor, commissionId: string, input: MakeDelivery): Promise<Delivery> {
  return ctx.knex.transaction(async (trx) => {
    const commission = await lockOpenCommission(actor, commissionId, trx);
    const known = await Delivery.within(actor, trx).findOne({ commissionId, idempotencyKey: input.key });
    if (known) return known;
    const files = await chosenFiles(trx, actor, commissionId, input.finalVersionIds);
    const delivery = await insertDelivery(trx, actor, commissionId, input);
    await insertFiles(trx, delivery, files);
    await addRecipientRows(trx, delivery, input.recipients);
    await requestArchives(trx, commission, delivery, files.length);
    await tell(trx, actor, delivery, files.length, input);
    return delivery;
  });
}

/** Versions must be there, of finals of this commission, and of different ones: a delivery holds a picture once. */
async function chosenFiles(trx: Transaction, actor: StaffActor, commissionId: string, versionIds: string[]): Promise<ChosenFile[]> {
  const [finals, picks] = [await loadFinals(actor, commissionId, trx), await currentPicks(actor, commissionId, trx)];
  const finalOf = new Map<string, LoadedFinal>();
  for (const final of finals) for (const version of final.versions) finalOf.set(version.id, final);
  const chosen = versionIds.map((id) => finalOf.get(id));
  if (chosen.some((final) => !final))
    throw invalid([{ path: 'finalVersionIds', message: 'One of the files is not there any more. Look at the finals again.' }]);
  if (new Set(chosen).size < chosen.length) throw invalid([{ path: 'finalVersionIds', message: 'Choose one version of each final.' }]);
  return versionIds.flatMap((id) => {
    const final = finalOf.get(id);
    const version = final?.versions.find((one) => one.id === id);
    return final && version
      ? [
          {
            version,
            title: titleOf(
              final,
              picks.find((pick) => pick.frameId === final.frameId),
            ),
          },
        ]
      : [];
  });
}

async function insertDelivery(trx: Transaction, actor: StaffActor, commissionId: string, input: MakeDelivery): Promise<Delivery> {
  const last = await Delivery.within(actor, trx).where({ commissionId }).max('number as number').first();
  return Delivery.query(trx)
    .insert({
      studioId: actor.studioId,
      commissionId,
      number: (last?.number ?? 0) + 1,
      words: input.words,
      fetchBy: input.fetchBy,
      endsAt: await lastMoment(trx, actor, input.fetchBy),
      idempotencyKey: input.key,
      createdBy: actor.accountId,
    })
    .returning('*');
}

async function insertFiles(trx: Transaction, delivery: Delivery, files: ChosenFile[]): Promise<void> {
  const names = distinctNames(files.map(({ version }) => cleanFileName(version.name)));
  const rows = files.map(({ version, title }, index) => ({
    studioId: delivery.studioId,
    deliveryId: delivery.id,
    finalVersionId: version.id,
    position: index + 1,
    name: names[index] ?? version.name,
    title,
  }));
  await DeliveryFile.query(trx).insert(rows);
}

async function requestArchives(trx: Transaction, commission: Commission, delivery: Delivery, files: number): Promise<void> {
  const { id: deliveryId, studioId, commissionId } = delivery;
  for (const kind of ['full', 'web'] as const) {
    const name = `${commission.title} – delivery ${delivery.number}${kind === 'web' ? ', web size' : ''}`;
    await requestArchive(trx, { studioId, commissionId, of: { deliveryId, kind }, name, files });
  }
}

async function tell(trx: Transaction, actor: StaffActor, delivery: Delivery, files: number, input: MakeDelivery): Promise<void> {
  const { studioId, commissionId, number } = delivery;
  const says = `Made delivery ${number} of ${files === 1 ? 'one file' : `${files} files`} for ${input.recipients.map((person) => person.name).join(', ')}`;
  await addToRecord(trx, { studioId, commissionId, actor, did: 'delivery.made', says, about: { deliveryId: delivery.id } });
  await announce(trx, `commission:${commissionId}`, { what: 'delivery-changed', deliveryId: delivery.id });
}
