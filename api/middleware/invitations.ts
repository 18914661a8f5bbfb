import { sheetIsOver } from '../domain/sheet-state.ts';
import { Commission } from '../models/Commission.ts';
import { Delivery } from '../models/Delivery.ts';
import { DeliveryRecipient } from '../models/DeliveryRecipient.ts';
import { Sheet } from '../models/Sheet.ts';
import { SheetGuest } from '../models/SheetGuest.ts';
import { problem } from './problem.ts';

/** The commission of a sheet or a delivery; one that was deleted takes its links along. */
function commissionOf(table: 'sheets' | 'deliveries') {
  return Commission.query()
    .select('commissions.id')
    .whereColumn('commissions.id', `${table}.commissionId`)
    .whereNull('commissions.deletedAt');
}

/**
 * The invitation of an account to a sheet; undefined where there is none, or the sheet was taken back.
 * @throws Problem 410 once the sheet's time is over: a session outlives the sheet it was opened for
 */
export async function invitationTo(sheetId: string, accountId: string): Promise<SheetGuest | undefined> {
  const invitation = await SheetGuest.query().findOne({ sheetId, accountId }).whereNull('withdrawnAt');
  const sheet =
    invitation &&
    (await Sheet.query()
      .findById(invitation.sheetId)
      .whereNotNull('issuedAt')
      .whereNull('withdrawnAt')
      .whereExists(commissionOf('sheets'))
      .select('id', 'endsAt'));
  if (!sheet) return undefined;
  if (sheetIsOver(sheet, new Date()))
    throw problem(410, 'The time of this proof sheet is over. Please write to the studio if you still need it.', { code: 'ended' });
  return invitation;
}

/** The place of an account among the recipients of a delivery; undefined where there is none, or the delivery was taken back. */
export async function placeInDelivery(deliveryId: string, accountId: string): Promise<DeliveryRecipient | undefined> {
  const recipient = await DeliveryRecipient.query().findOne({ deliveryId, accountId }).whereNull('withdrawnAt');
  const delivery =
    recipient &&
    (await Delivery.query()
      .findById(recipient.deliveryId)
      .whereNotNull('sentAt')
      .whereNull('withdrawnAt')
      .whereExists(commissionOf('deliveries'))
      .select('id'));
  return delivery && recipient;
}
