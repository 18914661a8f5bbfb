import type { SentPickList } from '../../contract/guest-sheets.ts';
import { PickList } from '../../models/PickList.ts';
import type { SheetGuest } from '../../models/SheetGuest.ts';

/** The pick lists that were sent from a guest's sheet, the newest first. */
export async function listSent(invitation: SheetGuest): Promise<SentPickList[]> {
  const lists = await PickList.within(invitation)
    .where({ sheetId: invitation.sheetId })
    .orderBy('number', 'desc')
    .withGraphFetched('picks')
    .modifyGraph('picks', (picks) => picks.orderBy('number').select('proofId', 'pickListId'));
  return lists.map(presentSent);
}

/** A pick list, with its picks, as the guests of its sheet see it. */
export function presentSent(list: PickList): SentPickList {
  return {
    number: list.number,
    sentAt: list.sentAt.toISOString(),
    sentBy: list.sentByName,
    words: list.words,
    picks: list.pickCount,
    allowance: list.allowance,
    extras: list.extraCount,
    extraPrice: list.extraPrice,
    currency: list.currency,
    proofIds: (list.picks ?? []).map((pick) => pick.proofId),
  };
}
