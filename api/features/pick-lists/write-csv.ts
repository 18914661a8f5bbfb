import { stringify } from 'csv-stringify/sync';
import type { PickListDetail } from '../../contract/pick-lists.ts';

/**
 * The list as CSV (RFC 4180: CRLF, quotes doubled), with a byte-order mark so that spreadsheets read it as UTF-8. Cells that a spreadsheet
 * would take for a formula get an apostrophe in front (OWASP, CSV injection): names come from strangers' files and forms.
 */
export function pickListCsv(list: PickListDetail): string {
  const rows = list.picks.map((pick) => ({
    Pick: pick.number,
    Proof: pick.proofNumber,
    View: pick.viewTitle ?? 'Also made',
    Frame: pick.frameName,
    Exposures: pick.frames.length,
    Frames: pick.frames.map(({ name }) => name).join(', '),
    Extra: pick.extra ? 'yes' : 'no',
    'Marked by': pick.markedBy.map((guest) => guest.name).join(', '),
  }));
  return stringify(rows, { header: true, bom: true, record_delimiter: '\r\n', escape_formulas: true });
}

/**
 * The names without their ending, on one line with single spaces: what raw converters and file managers take in their search box. Names with
 * spaces stand in quotation marks.
 */
export function pickListNames(list: PickListDetail): string {
  const stems = list.picks.flatMap((pick) => pick.frames.map(({ name }) => name.replace(/\.[^.]{1,5}$/, '')));
  return stems.map((stem) => (/\s/.test(stem) ? `"${stem}"` : stem)).join(' ');
}
