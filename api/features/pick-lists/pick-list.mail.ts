import { formatMoney, timesMoney } from '../../domain/money.ts';
import type { PickList } from '../../models/PickList.ts';
import { type WrittenMail, writeMail } from '../mail/layout.ts';
import { t } from '../mail/words.ts';
import type { SheetForMail } from '../sheets/sheet-for-mail.ts';
import type { MarkedProof } from './picks-in-order.ts';

/** A mail names so many picks and counts the rest: the page has them all. */
const MOST_LINES = 40;

/** Tells the studio that a pick list is in, with a summary. */
export function pickListMail(mail: SheetForMail & { list: PickList; picks: MarkedProof[]; link: string }): WrittenMail {
  const { list, picks, commission } = mail;
  return writeMail({
    subject: t('pickList.subject', { number: list.number, title: commission.title }),
    paragraphs: [t('pickList.what', { name: list.sentByName, number: list.number, count: list.pickCount })],
    quote: { by: list.sentByName, words: list.words },
    facts: [
      { label: t('sheet.commission'), value: commission.title },
      { label: t('pickList.picks'), value: String(list.pickCount) },
      { label: t('pickList.included'), value: String(list.allowance) },
      { label: t('pickList.extras'), value: String(list.extraCount) },
      ...(list.extraCount > 0
        ? [
            {
              label: t('pickList.cost'),
              value: formatMoney({ minor: timesMoney(list.extraPrice, list.extraCount), currency: list.currency }),
            },
          ]
        : []),
    ],
    action: { words: t('pickList.action'), address: mail.link },
    after: [lines(picks)],
    why: t('pickList.why'),
  });
}

function lines(picks: MarkedProof[]): string {
  const named = picks.slice(0, MOST_LINES).map((pick, index) =>
    t('pickList.line', {
      number: index + 1,
      proof: pick.proofNumber,
      view: pick.viewTitle ?? t('pickList.alsoMade'),
      frame: pick.frameName,
    }),
  );
  const more = picks.length - named.length;
  return [...named, ...(more > 0 ? [t('pickList.more', { count: more })] : [])].join('\n');
}

/** Tells the lead that the list has arrived, and what happens next. */
export function pickListReceiptMail(mail: SheetForMail & { list: PickList; guest: string }): WrittenMail {
  const { list, studio, commission } = mail;
  return writeMail({
    subject: t('pickListReceipt.subject', { title: commission.title }),
    studioName: studio.name,
    replyTo: studio.replyTo,
    greeting: t('sheet.greeting', { name: mail.guest }),
    paragraphs: [t('pickListReceipt.what', { number: list.number, count: list.pickCount, studio: studio.name }), t('pickListReceipt.next')],
    why: t('pickListReceipt.why'),
  });
}
