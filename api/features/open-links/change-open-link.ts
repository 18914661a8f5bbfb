import type { Knex } from 'knex';
import type { OpenLinkTerms } from '../../contract/open-links.ts';
import type { Context } from '../../context.ts';
import type { StaffActor } from '../../middleware/actor.ts';
import { invalid, problem } from '../../middleware/problem.ts';
import { AccountToken } from '../../models/AccountToken.ts';
import { OpenLink } from '../../models/OpenLink.ts';
import type { Sheet } from '../../models/Sheet.ts';
import { newToken } from '../guests/tokens.ts';
import { addToRecord } from '../record/add-to-record.ts';
import { announceSheet } from '../sheets/announce-sheet.ts';
import { endOfDay } from '../sheets/change-sheet.ts';
import { findSheet, holdSheet } from '../sheets/find-sheet.ts';
import { sheetCan } from '../sheets/policy.ts';
import { hashPassphrase } from './passphrases.ts';
import { sealToken } from './sealed-token.ts';

/**
 * Switches the open link of a sheet on, under a new address.
 * @throws Problem 409 for a draft, a sheet that is closed, or where the link is on; 422 for a last day that has passed or comes after the sheet's
 */
export async function switchOpenLinkOn(ctx: Context, actor: StaffActor, sheetId: string, terms: OpenLinkTerms): Promise<Sheet> {
  const passphraseHash = terms.passphrase ? await hashPassphrase(terms.passphrase) : null;
  return withSheet(ctx, actor, sheetId, async (trx, sheet) => {
    refuseClosedSheet(sheet);
    if (await presentLink(trx, actor, sheetId)) throw problem(409, 'The open link of this sheet is on already.', { code: 'on-already' });
    const { token, hash } = newToken();
    const sealedToken = sealToken(ctx.config.secret, sheetId, token);
    const made = { studioId: actor.studioId, sheetId, tokenHash: hash, sealedToken, passphraseHash, createdBy: actor.accountId };
    const link = await OpenLink.query(trx).insertAndFetch(made);
    if (terms.endsOn) await setLastDay(trx, sheet, link.id, terms.endsOn);
    return { did: 'sheet.open-link-on', says: `Switched the open link of proof sheet ${sheet.number} on` };
  });
}

/** Changes what the open link asks for, or its last day. @throws Problem 409 where it is not on, 422 as above */
export async function changeOpenLink(ctx: Context, actor: StaffActor, sheetId: string, terms: OpenLinkTerms): Promise<Sheet> {
  const { passphrase, endsOn } = terms;
  const passphraseHash = passphrase ? await hashPassphrase(passphrase) : null;
  return withSheet(ctx, actor, sheetId, async (trx, sheet) => {
    refuseClosedSheet(sheet);
    const link = await presentLink(trx, actor, sheetId);
    if (!link) throw problem(409, 'The open link of this sheet is not on.', { code: 'not-on' });
    if (passphrase !== undefined) await OpenLink.query(trx).findById(link.id).patch({ passphraseHash });
    if (passphrase) await beginNewRound(trx, link.id);
    if (endsOn !== undefined) await setLastDay(trx, sheet, link.id, endsOn);
    const said = [
      passphrase === undefined ? '' : passphrase === null ? 'no passphrase any more' : 'a new passphrase',
      endsOn === undefined ? '' : endsOn === null ? 'the last date of the sheet as its end' : `${endsOn} as its last day`,
    ].filter(Boolean);
    if (said.length === 0) return undefined;
    return { did: 'sheet.open-link-changed', says: `Gave the open link of proof sheet ${sheet.number} ${said.join(' and ')}` };
  });
}

/** Withdraws the open link at once; doing it twice is the same as once. Who became a reviewer by it stays a guest. */
export async function withdrawOpenLink(ctx: Context, actor: StaffActor, sheetId: string): Promise<Sheet> {
  return withSheet(ctx, actor, sheetId, async (trx, sheet) => {
    const link = await presentLink(trx, actor, sheetId);
    if (!link) return undefined;
    await OpenLink.query(trx).findById(link.id).patch({ withdrawnAt: new Date(), sealedToken: null });
    return { did: 'sheet.open-link-withdrawn', says: `Withdrew the open link of proof sheet ${sheet.number}` };
  });
}

type Done = { did: `sheet.${string}`; says: string } | undefined;

/** Holds the sheet, does what is to be done, and tells the record and the open pages; nothing is told where nothing changed. */
async function withSheet(
  ctx: Context,
  actor: StaffActor,
  sheetId: string,
  act: (trx: Knex.Transaction, sheet: Sheet) => Promise<Done>,
): Promise<Sheet> {
  await ctx.knex.transaction(async (trx) => {
    const sheet = await holdSheet(actor, sheetId, trx);
    const done = await act(trx, sheet);
    if (!done) return;
    await announceSheet(trx, sheet, 'sheet');
    const { studioId } = actor;
    await addToRecord(trx, { studioId, commissionId: sheet.commissionId, actor, ...done, about: { sheetId } });
  });
  return findSheet(actor, sheetId);
}

async function presentLink(trx: Knex.Transaction, actor: StaffActor, sheetId: string): Promise<OpenLink | undefined> {
  return OpenLink.within(actor, trx).where({ sheetId }).whereNull('withdrawnAt').first();
}

function refuseClosedSheet(sheet: Sheet): void {
  if (!sheet.issuedAt) throw problem(409, 'Send the sheet first: a draft has no open link.', { code: 'draft' });
  if (!sheetCan(sheet, 1, new Date()).openLink)
    throw problem(409, 'This sheet was taken back or its last date has passed. Nobody can look by a link.', { code: 'sheet-closed' });
}

/** Whoever looks since an earlier passphrase has to give the new one, also to confirm an address they gave before. */
async function beginNewRound(trx: Knex.Transaction, openLinkId: string): Promise<void> {
  await OpenLink.query(trx).findById(openLinkId).increment('round', 1);
  await AccountToken.query(trx).where({ openLinkId }).whereNull('usedAt').patch({ expiresAt: new Date() });
}

async function setLastDay(trx: Knex.Transaction, sheet: Sheet, openLinkId: string, day: string | null): Promise<void> {
  const [row] = await trx('openLinks')
    .where({ id: openLinkId })
    .update({ endsOn: day, endsAt: day === null ? null : endOfDay(trx, day, sheet.studioId) })
    .returning<{ endsAt: Date | null }[]>('endsAt');
  const endsAt = row?.endsAt;
  if (!endsAt) return;
  if (endsAt <= new Date()) throw invalid([{ path: 'endsOn', message: 'This day has passed already.' }]);
  if (sheet.endsAt && endsAt > sheet.endsAt)
    throw invalid([{ path: 'endsOn', message: `The link ends with the sheet at the latest, on ${sheet.chooseBy ?? 'its last date'}.` }]);
}
