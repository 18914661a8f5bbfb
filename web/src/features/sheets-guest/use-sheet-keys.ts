import { useCallback, type KeyboardEvent, type RefObject } from 'react';
import type { GuestProof } from '../../../../api/contract/guest-sheets.ts';
import type { VirtualRowsHandle } from '../../ui/virtual-rows.tsx';
import { marksOf, type ProofMarks } from '../marks/read-marks.ts';
import { stepOnSheet, type SheetRow, type Step } from './sheet-rows.ts';

const STEPS: Record<string, Step> = {
  ArrowLeft: 'left',
  ArrowRight: 'right',
  ArrowUp: 'up',
  ArrowDown: 'down',
  Home: 'first',
  End: 'last',
};

/** Frames to wait until a row that was scrolled to is in the document. */
const PATIENCE = 30;

interface Options {
  rows: readonly SheetRow[];
  gap: number;
  list: RefObject<VirtualRowsHandle | null>;
  marks: ReadonlyMap<string, ProofMarks>;
  onMark: ((proof: GuestProof, wanted: boolean) => void) | undefined;
}

function focusPosition(position: string, patience = PATIENCE): void {
  const link = document.querySelector<HTMLElement>(`[data-position="${position}"]`);
  if (link) link.focus({ preventScroll: true });
  else if (patience > 0) requestAnimationFrame(() => focusPosition(position, patience - 1));
}

/**
 * The keys of the sheet, which act only while a picture has the focus (so nothing is pressed by accident elsewhere, and
 * WCAG 2.1.4 is met without a switch): arrows move, Home and End go to the ends, Space marks, Enter follows the link.
 */
export function useSheetKeys({ rows, gap, list, marks, onMark }: Options) {
  const focusAt = useCallback(
    ({ row, at }: { row: number; at: number }) => {
      list.current?.scrollToRow(row);
      focusPosition(`${row}/${at}`);
    },
    [list],
  );

  const focusProof = useCallback(
    (number: number) => {
      const row = rows.findIndex((one) => one.proofs.some((proof) => proof.number === number));
      const at = rows[row]?.proofs.findIndex((proof) => proof.number === number) ?? -1;
      if (at >= 0) focusAt({ row, at });
    },
    [rows, focusAt],
  );

  const onKeyDown = (event: KeyboardEvent) => {
    const position = event.target instanceof HTMLElement ? event.target.dataset.position : undefined;
    if (!position || event.ctrlKey || event.metaKey || event.altKey) return;
    const [row = 0, at = 0] = position.split('/').map(Number);
    const step = STEPS[event.key];
    if (step) {
      event.preventDefault();
      focusAt(stepOnSheet(rows, { row, at }, step, gap));
    }
    const proof = rows[row]?.proofs[at];
    if (event.key === ' ' && proof) {
      event.preventDefault();
      if (!event.repeat) onMark?.(proof, !marksOf(marks, proof.id).mine);
    }
  };

  return { onKeyDown, focusProof };
}
