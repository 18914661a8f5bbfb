import type { TransactionOrKnex } from 'objection';
import type { StudioScope } from '../../db/scope.ts';
import type { Frame } from '../../models/Frame.ts';
import { Pick } from '../../models/Pick.ts';
import { framesOfPick, framesOfPicks } from '../pick-lists/picked-frames.ts';

/** A pick that waits for its final, or has it: from the newest list of one of the commission's sheets. */
export interface CurrentPick {
  frameId: string;
  frameName: string;
  /** Number in its list; a frame picked on two sheets stands once, with the first. */
  number: number;
  sheetNumber: number;
  viewTitle: string | null;
  extra: boolean;
  frame: Frame;
  /** Every frame of a bracket, the lead first; else the frame alone. */
  frames: Frame[];
}

interface PickOfSheet extends Pick {
  sheetNumber: number;
}

/** The picks of the newest pick list of every sheet of a commission, in the order of sheets and picks. */
export async function currentPicks(scope: StudioScope, commissionId: string, db?: TransactionOrKnex): Promise<CurrentPick[]> {
  const rows = (await Pick.within(scope, db)
    .join('pickLists', 'pickLists.id', 'picks.pickListId')
    .join('sheets', 'sheets.id', 'pickLists.sheetId')
    .where('pickLists.commissionId', commissionId)
    .whereNotExists(
      Pick.knexQuery().from('pickLists as newer').whereRaw('newer.sheet_id = pick_lists.sheet_id and newer.number > pick_lists.number'),
    )
    .orderBy(['sheets.number', 'picks.number'])
    .select('picks.*', 'sheets.number as sheetNumber')) as PickOfSheet[];
  const byId = await framesOfPicks(scope, rows, db);
  const seen = new Set<string>();
  return rows.flatMap((row) => {
    const { frameId, frameName, number, sheetNumber, viewTitle, extra } = row;
    const frame = byId.get(frameId);
    if (!frame || seen.has(frameId)) return [];
    seen.add(frameId);
    const frames = [frame, ...framesOfPick(row, byId).filter(({ id }) => id !== frameId)];
    return [{ frameId, frameName, number, sheetNumber, viewTitle, extra, frame, frames }];
  });
}
