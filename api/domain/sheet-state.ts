/** The states of a proof sheet, derived from its moments and never stored. */
export type SheetState = 'Draft' | 'Open' | 'Sent' | 'Ended';

/** How long a sheet can still be looked at after its last date. */
export const SHEET_STAYS_DAYS = 30;

/** The moments of a sheet that decide its state; any form a Date accepts. */
export interface SheetMoments {
  /** First issued to guests; null for a draft. */
  issuedAt: Date | string | null;
  /** The lead sent the pick list and the sheet was not reopened since. */
  sentAt: Date | string | null;
  /** The last moment to choose; null where no last date was set. */
  endsAt: Date | string | null;
  withdrawnAt?: Date | string | null;
}

/**
 * The state of a sheet at a moment. A sent sheet stays Sent after its last date: what was sent counts. A sheet taken back
 * by the studio has ended, whatever else happened to it.
 */
export function sheetState(sheet: SheetMoments, now: Date): SheetState {
  if (sheet.withdrawnAt) return 'Ended';
  if (!sheet.issuedAt) return 'Draft';
  if (sheet.sentAt) return 'Sent';
  return sheet.endsAt && new Date(sheet.endsAt) <= now ? 'Ended' : 'Open';
}

/** Whether the time in which a sheet can be looked at is over as well. */
export function sheetIsOver({ endsAt }: Pick<SheetMoments, 'endsAt'>, now: Date): boolean {
  return endsAt !== null && new Date(endsAt).getTime() + SHEET_STAYS_DAYS * 24 * 60 * 60 * 1000 <= now.getTime();
}
