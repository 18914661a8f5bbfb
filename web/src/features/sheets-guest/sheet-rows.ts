import type { GuestProof, GuestProofs } from '../../../../api/contract/guest-sheets.ts';
import { justify, stack } from '../../ui/justify.ts';

export interface Storey {
  /** 1 for the first view; null for "Also made". */
  view: number | null;
  viewId: string | null;
  title: string;
  askedFor: string;
  proofs: GuestProof[];
}

export interface SheetRow {
  storey: Storey;
  /** The storey's words stand beside, or on a phone above, its first row. */
  isFirst: boolean;
  proofs: GuestProof[];
  /** CSS pixels of each cell, in order; a picture narrower than its cell is centred in it. */
  widths: number[];
  height: number;
}

export interface SheetMeasures {
  /** Width of the whole sheet in CSS pixels. */
  width: number;
  /** Left gutter for the words; 0 where they stand above the pictures. */
  gutter: number;
  gap: number;
  rowHeight: number;
  /** One picture a row. */
  stacked: boolean;
  /** No picture gets higher than this. */
  maxHeight: number;
}

/** The storeys in their order with the proofs that hang in them; views without proofs are left out, "Also made" comes last. */
export function readStoreys({ storeys, proofs }: Pick<GuestProofs, 'storeys' | 'proofs'>): Storey[] {
  const hung = new Map<string | null, GuestProof[]>();
  const titled = new Set(storeys.map((storey) => storey.viewId));
  for (const proof of proofs) {
    const viewId = titled.has(proof.viewId) ? proof.viewId : null;
    hung.set(viewId, [...(hung.get(viewId) ?? []), proof]);
  }
  const views = storeys.filter((storey) => storey.viewId !== null);
  const named = views.map((storey, at) => ({ ...storey, view: at + 1, proofs: hung.get(storey.viewId) ?? [] }));
  const also = { view: null, viewId: null, title: '', askedFor: '', proofs: hung.get(null) ?? [] };
  return [...named, also].filter((storey) => storey.proofs.length > 0);
}

/** How a sheet of a given width is measured: gutter and justified rows from 768 px, one picture a row on a phone. */
export function measureSheet(width: number, windowHeight: number): SheetMeasures {
  const stacked = width < 620;
  return {
    width,
    gutter: width >= 900 ? 214 : 0,
    gap: 12,
    rowHeight: 232,
    stacked,
    maxHeight: stacked ? Math.max(320, windowHeight * 0.72) : 340,
  };
}

/** A cell is never narrower than what stands below its picture needs; a very tall picture is centred in it. */
const NARROWEST = 0.6;

function cellOf({ width, height }: GuestProof): { width: number; height: number } {
  return { width: Math.max(width, height * NARROWEST), height };
}

/** The rows of the sheet from its first storey to its last. */
export function layRows(storeys: readonly Storey[], measures: SheetMeasures): SheetRow[] {
  const width = measures.width - measures.gutter;
  if (width <= 0) return [];
  return storeys.flatMap((storey) => {
    const rows = measures.stacked
      ? stack(storey.proofs, width, measures.maxHeight)
      : justify(storey.proofs.map(cellOf), { width, rowHeight: measures.rowHeight, gap: measures.gap, maxHeight: measures.maxHeight });
    return rows.map((row, at) => ({
      storey,
      isFirst: at === 0,
      proofs: storey.proofs.slice(row.first, row.first + row.widths.length),
      widths: row.widths,
      height: row.height,
    }));
  });
}

export type Step = 'left' | 'right' | 'up' | 'down' | 'first' | 'last';

/** The middle of a picture in its row, in CSS pixels from the row's left. */
function middleOf(row: SheetRow, at: number, gap: number): number {
  return row.widths.slice(0, at).reduce((sum, width) => sum + width + gap, 0) + (row.widths[at] ?? 0) / 2;
}

/** Where an arrow key leads from a proof: the neighbour in the row, or the nearest in the row above or below. */
export function stepOnSheet(
  rows: readonly SheetRow[],
  from: { row: number; at: number },
  step: Step,
  gap: number,
): { row: number; at: number } {
  const row = rows[from.row];
  if (!row) return from;
  const end = (index: number) => ({ row: index, at: (rows[index]?.widths.length ?? 1) - 1 });
  if (step === 'first') return { row: 0, at: 0 };
  if (step === 'last') return end(rows.length - 1);
  if (step === 'left') return from.at > 0 ? { ...from, at: from.at - 1 } : from.row > 0 ? end(from.row - 1) : from;
  if (step === 'right') {
    if (from.at < row.widths.length - 1) return { ...from, at: from.at + 1 };
    return from.row < rows.length - 1 ? { row: from.row + 1, at: 0 } : from;
  }
  const target = rows[from.row + (step === 'up' ? -1 : 1)];
  if (!target) return from;
  const middle = middleOf(row, from.at, gap);
  const distances = target.widths.map((_, at) => Math.abs(middleOf(target, at, gap) - middle));
  return { row: rows.indexOf(target), at: distances.indexOf(Math.min(...distances)) };
}
