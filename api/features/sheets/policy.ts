import { type SheetMoments, sheetState } from '../../domain/sheet-state.ts';

export interface SheetCan {
  edit: boolean;
  issue: boolean;
  invite: boolean;
  withdraw: boolean;
  reopen: boolean;
  remove: boolean;
}

/** What the studio may do to a sheet in its present state. Owner and assistant may the same. */
export function sheetCan(sheet: SheetMoments, proofCount: number, now: Date): SheetCan {
  const state = sheetState(sheet, now);
  return {
    edit: state === 'Draft' || state === 'Open',
    issue: state === 'Draft' && proofCount > 0,
    invite: state !== 'Draft' && !sheet.withdrawnAt,
    withdraw: state !== 'Draft' && !sheet.withdrawnAt,
    reopen: state === 'Sent' || (state === 'Ended' && !sheet.withdrawnAt),
    remove: state === 'Draft',
  };
}
