import type { Transaction } from 'objection';
import type { Bracket } from '../../models/Bracket.ts';
import type { Frame } from '../../models/Frame.ts';
import { Proof } from '../../models/Proof.ts';
import { Sheet } from '../../models/Sheet.ts';
import { renumber, touchSheet } from '../sheets/change-proofs.ts';

/** The proofs of frames, alone or as a bracket, on drafts and on sheets that are out, sheet by sheet in their order. */
async function proofsBySheet(trx: Transaction, bracket: Bracket, frames: readonly Frame[]): Promise<[Sheet, Proof[]][]> {
  const proofs = await Proof.within(bracket, trx)
    .where((any) =>
      any.where({ bracketId: bracket.id }).orWhereIn(
        'frameId',
        frames.map(({ id }) => id),
      ),
    )
    .orderBy(['position', 'id']);
  const sheets = await Sheet.within(bracket, trx).findByIds([...new Set(proofs.map(({ sheetId }) => sheetId))]);
  return sheets.map((sheet) => [sheet, proofs.filter(({ sheetId }) => sheetId === sheet.id)]);
}

/**
 * Makes the frames of a bracket one proof on every draft they lie on, and has its pictures made anew where they changed. What a client has
 * been shown stays a proof of its own.
 */
export async function layBracketProofs(trx: Transaction, bracket: Bracket, frames: readonly Frame[], changed: boolean): Promise<void> {
  for (const [sheet, proofs] of await proofsBySheet(trx, bracket, frames)) {
    const theirs = sheet.issuedAt ? proofs.filter(({ bracketId }) => bracketId === bracket.id) : proofs;
    const kept = theirs.find(({ bracketId }) => bracketId === bracket.id) ?? theirs[0];
    const alone = theirs.length === 1 && kept?.bracketId === bracket.id && kept.frameId === bracket.leadFrameId;
    if (!kept || (alone && !changed)) continue;
    const others = theirs.filter(({ id }) => id !== kept.id).map(({ id }) => id);
    await Proof.within(bracket, trx).whereIn('id', others).delete();
    const now = { bracketId: bracket.id, frameId: bracket.leadFrameId, watermarkHash: null };
    await Proof.within(bracket, trx).findById(kept.id).patch(now);
    await changeSheet(trx, sheet);
  }
}

/**
 * Makes a bracket's proof on every draft one of its lead frame. The row is a new one, so that its pictures have new keys: the old ones may have
 * been of another frame.
 */
export async function layLeadProofs(trx: Transaction, bracket: Bracket): Promise<void> {
  for (const [sheet, proofs] of await proofsBySheet(trx, bracket, [])) {
    for (const { id, studioId, sheetId, frameId, viewId, number, position } of proofs) {
      await Proof.within(bracket, trx).deleteById(id);
      await Proof.query(trx).insert({ studioId, sheetId, frameId, viewId, number, position });
    }
    await changeSheet(trx, sheet);
  }
}

async function changeSheet(trx: Transaction, sheet: Sheet): Promise<void> {
  if (!sheet.issuedAt) await renumber(trx, sheet.id);
  await touchSheet(trx, sheet.id, sheet.commissionId);
}
