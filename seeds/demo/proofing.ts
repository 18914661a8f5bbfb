import { setMark } from '../../api/features/marks/set-mark.ts';
import { picksInOrder } from '../../api/features/pick-lists/picks-in-order.ts';
import { sendPickList } from '../../api/features/pick-lists/send-pick-list.ts';
import { changeSheet } from '../../api/features/sheets/change-sheet.ts';
import { issueSheet } from '../../api/features/sheets/issue-sheet.ts';
import { makeSheet } from '../../api/features/sheets/make-sheet.ts';
import { Proof } from '../../api/models/Proof.ts';
import type { Sheet } from '../../api/models/Sheet.ts';
import { SheetGuest } from '../../api/models/SheetGuest.ts';
import { guestActor } from './accounts.ts';
import { framesByName } from './bring-files.ts';
import { type MailedTokens, mailedTokens } from './mailed-token.ts';
import type { Person } from './people.ts';
import { dayFromNow, type Stage, until } from './stage.ts';

/** Makes a draft of the frames named, and waits until the watermark lies on its proofs. */
export async function draftSheet(stage: Stage, commissionId: string, stems: readonly string[], chooseInDays: number): Promise<Sheet> {
  const frame = await framesByName(commissionId);
  const made = await makeSheet(stage.ctx, stage.owner, commissionId, stems.map((stem) => frame(stem).id)); // prettier-ignore
  const watermark = { kind: 'text' as const, text: 'HARROW LANE', opacity: 0.4, size: 0.5, tiled: false };
  const sheet = await changeSheet(stage.ctx, stage.owner, made.id, made.version, { chooseBy: dayFromNow(chooseInDays), watermark });
  await until(stage, `the watermarks of ${stems.length} proofs`, async () => {
    const waiting = await Proof.query()
      .where({ sheetId: sheet.id })
      .where((any) => any.whereNull('watermarkHash').orWhereNot({ watermarkHash: sheet.watermarkHash }))
      .resultSize();
    return waiting === 0 ? true : undefined;
  });
  return sheet;
}

/** Opens a sheet to its lead and reviewers. Returns the secrets of their links. */
export async function openToGuests(
  stage: Stage,
  sheet: Sheet,
  lead: Person,
  reviewers: readonly Person[],
  words: string,
): Promise<MailedTokens> {
  const guests = [
    { name: lead.name, email: lead.email, role: 'lead' as const },
    ...reviewers.map(({ name, email }) => ({ name, email, role: 'reviewer' as const })),
  ];
  return mailedTokens(stage.ctx, (within) => issueSheet(within, stage.owner, sheet.id, guests, words));
}

/** Somebody marks the proofs of the frames named. */
export async function mark(stage: Stage, sheet: Sheet, person: Person, stems: readonly string[]): Promise<void> {
  const actor = await guestActor(person);
  const frame = await framesByName(sheet.commissionId);
  for (const stem of stems) {
    const proof = await Proof.query()
      .findOne({ sheetId: sheet.id, frameId: frame(stem).id })
      .throwIfNotFound();
    await setMark(stage.ctx, actor, sheet.id, proof.id, true);
  }
}

/** The lead sends what they picked. */
export async function sendPicks(stage: Stage, sheet: Sheet, lead: Person, words: string): Promise<void> {
  const actor = await guestActor(lead);
  const invitation = await SheetGuest.query().findOne({ sheetId: sheet.id, accountId: actor.accountId }).throwIfNotFound();
  const picks = await picksInOrder(stage.ctx.knex, sheet.id);
  await sendPickList(stage.ctx, actor, invitation, { proofIds: picks.map(({ proofId }) => proofId), words });
}
