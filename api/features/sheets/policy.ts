import { type SheetMoments, sheetState } from '../../domain/sheet-state.ts';

export interface SheetCan {
  edit: boolean;
  issue: boolean;
  invite: boolean;
  withdraw: boolean;
  reopen: boolean;
  remove: boolean;
  /** Money is the owner's. */
  price: boolean;
  /** Switch the open link on, or change it. */
  openLink: boolean;
}

const hasPassed = (moment: SheetMoments['endsAt'], now: Date) => moment !== null && new Date(moment) <= now;

/** What a person of the studio may do to a sheet in its present state. */
export function sheetCan(sheet: SheetMoments, proofCount: number, now: Date, role: 'owner' | 'assistant' = 'assistant'): SheetCan {
  const state = sheetState(sheet, now);
  return {
    edit: state === 'Draft' || state === 'Open',
    issue: state === 'Draft' && proofCount > 0,
    invite: state !== 'Draft' && !sheet.withdrawnAt,
    withdraw: state !== 'Draft' && !sheet.withdrawnAt,
    reopen: state === 'Sent' || (state === 'Ended' && !sheet.withdrawnAt),
    remove: state === 'Draft',
    openLink: state === 'Open' || (state === 'Sent' && !hasPassed(sheet.endsAt, now)),
    price: role === 'owner' && (state === 'Draft' || state === 'Open'),
  };
}
