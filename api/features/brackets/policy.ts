import type { Bracket } from '../../contract/brackets.ts';
import type { Commission } from '../../models/Commission.ts';
import type { Shown } from './shown-frames.ts';

/** Why frames cannot be grouped otherwise, in one sentence; null where they can. What a client has been shown or picked stays as it is. */
export function whyNotRegrouped(shown: Shown | undefined): string | null {
  if (shown?.picked) return 'It is on a pick list that was sent to you.';
  if (shown) return `It is on proof sheet ${shown.sheetNumber}, which your client has.`;
  return null;
}

/** Why neither its lead nor what it shows can be changed: while a sheet is open it may, as the rest of the sheet. */
export function whyNotChanged(shown: Shown | undefined): string | null {
  if (shown?.picked) return whyNotRegrouped(shown);
  return shown?.closed ? `It is on proof sheet ${shown.sheetNumber}, which is closed. Reopen that first.` : null;
}

/** What the studio may do to a bracket; owner and assistant may the same. */
export function bracketCan(commission: Pick<Commission, 'closedAt'>, shown: Shown | undefined): Bracket['can'] {
  if (commission.closedAt) return { regroup: false, change: false, why: 'This commission is closed. Reopen it first.' };
  const why = whyNotRegrouped(shown);
  return { regroup: why === null, change: whyNotChanged(shown) === null, why };
}
