import type { Commission } from '../../models/Commission.ts';

/** What the studio may do to the frames of a commission; owner and assistant may the same. A closed one is reopened first. */
export function framesCan(commission: Pick<Commission, 'closedAt'>): { upload: boolean; change: boolean } {
  const open = commission.closedAt === null;
  return { upload: open, change: open };
}

/** What keeps a frame from being deleted. */
export interface FrameTies {
  /** Number of the proof sheet it lies on. */
  sheetNumber: number | null;
  sheetIssued: boolean;
  picked: boolean;
  hasFinal: boolean;
}

/** Why a frame cannot be deleted, in one sentence; null where it can. What a client has been shown or has picked stays. */
export function whyKept(ties: FrameTies): string | null {
  if (ties.hasFinal) return 'It has a finished file. Delete that first.';
  if (ties.picked) return 'It is on a pick list that was sent to you.';
  if (ties.sheetNumber === null) return null;
  if (ties.sheetIssued) return `It is on proof sheet ${ties.sheetNumber}, which your client has.`;
  return `It is on proof sheet ${ties.sheetNumber}. Take it off the sheet first.`;
}
