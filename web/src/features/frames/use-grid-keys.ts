import type { KeyboardEvent } from 'react';
import type { JustifiedRow } from '../../ui/justify.ts';
import { acrossRows } from './row-places.ts';
import { choose, chooseAll, chooseNone, moveTo, type Selection } from './selection.ts';

interface Grid {
  order: readonly string[];
  rows: readonly JustifiedRow[];
  gap: number;
  selection: Selection;
  change: (selection: Selection) => void;
  open: (id: string) => void;
  remove: () => void;
  showKeys: () => void;
}

/**
 * The keys of the grid, heard only while the focus is in it. Arrows move, with Shift they choose what they pass; Space
 * chooses, Enter opens, Ctrl or Cmd with A chooses all, Escape none, Delete asks whether to delete, ? lists these.
 */
export function pressInGrid(event: KeyboardEvent, grid: Grid): void {
  const act = actionOf(event, grid);
  if (!act) return;
  event.preventDefault();
  act();
}

function actionOf(event: KeyboardEvent, grid: Grid): (() => void) | undefined {
  const { order, selection, change } = grid;
  const focus = selection.focus ?? order[0];
  if (focus === undefined || event.altKey) return undefined;
  if (event.ctrlKey || event.metaKey) {
    return event.key.toLowerCase() === 'a' ? () => change(chooseAll(selection, order)) : undefined;
  }
  switch (event.key) {
    case ' ':
      return () => change(choose(selection, order, focus, event.shiftKey ? 'range' : 'also'));
    case 'Enter':
      return () => grid.open(focus);
    case 'Escape':
      return selection.chosen.size > 0 ? () => change(chooseNone(selection)) : undefined;
    case 'Delete':
    case 'Backspace':
      return grid.remove;
    case '?':
      return grid.showKeys;
  }
  const to = targetOf(event.key, order.indexOf(focus), grid);
  const id = to === undefined ? undefined : order[to];
  return id === undefined ? undefined : () => change(moveTo(selection, order, id, event.shiftKey));
}

function targetOf(key: string, at: number, { rows, gap, order }: Grid): number | undefined {
  switch (key) {
    case 'ArrowLeft':
      return Math.max(0, at - 1);
    case 'ArrowRight':
      return Math.min(order.length - 1, at + 1);
    case 'ArrowUp':
      return acrossRows(rows, at, -1, gap);
    case 'ArrowDown':
      return acrossRows(rows, at, 1, gap);
    case 'Home':
      return 0;
    case 'End':
      return order.length - 1;
    default:
      return undefined;
  }
}
