import { useCallback, useEffect, useImperativeHandle, useMemo, useRef, type MouseEvent, type ReactNode, type Ref } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { useWidth } from '../../ui/use-width.ts';
import { VirtualRows, type VirtualRowsHandle } from '../../ui/virtual-rows.tsx';
import { GAP, layGrid, type GridModel } from './grid-rows.ts';
import { GridRowView, type TilesShared } from './grid-row-view.tsx';
import { rowOf } from './row-places.ts';
import type { Section } from './sections.ts';
import { choose, type Manner, type Selection } from './selection.ts';
import { pressInGrid } from './use-grid-keys.ts';

/** The selection bar that stands over the lower edge. */
const FOOT = 72;

export interface FrameGridHandle {
  /** Scrolls to a frame and gives it the focus. */
  focusFrame(id: string): void;
}

interface Props {
  sections: readonly Section[];
  selection: Selection;
  onSelection: (selection: Selection) => void;
  views: ReadonlyMap<string, { title: string; number: number }>;
  /** Where a frame is shown large, or the merged picture of the bracket that it leads. */
  addressOf: (id: string, merged?: boolean) => string;
  onOpen: (id: string, merged?: boolean) => void;
  onDelete: () => void;
  onKeys: () => void;
  /** The buttons in a section's heading. */
  toolsOf: (section: Section) => ReactNode;
  /** Anything that moves the grid down or up the page when it changes. */
  above: string | number;
  ref?: Ref<FrameGridHandle>;
}

/** Any number of frames in their sections, of which one is reached by Tab and the others by the arrows. */
export function FrameGrid({ sections, selection, onSelection, views, addressOf, onOpen, onDelete, onKeys, toolsOf, above, ref }: Props) {
  const [columnRef, width] = useWidth();
  const model = useMemo(() => layGrid(sections, width), [sections, width]);
  const { order, rows, lines } = model;
  const virtual = useRef<VirtualRowsHandle>(null);
  const grid = useRef<HTMLDivElement>(null);
  const latest = useRef({ selection, order });
  useEffect(() => {
    latest.current = { selection, order };
  });
  const focusSoon = useFocusOn(grid, virtual, model);
  useImperativeHandle(ref, () => ({ focusFrame: focusSoon }), [focusSoon]);

  const pick = useCallback(
    (id: string, manner: Manner) => onSelection(choose(latest.current.selection, latest.current.order, id, manner)),
    [onSelection],
  );
  const onPress = useCallback((id: string, event: MouseEvent) => pick(id, mannerOf(event)), [pick]);
  const onMark = useCallback((id: string) => pick(id, 'also'), [pick]);
  const onChooseAll = useCallback(
    (frames: readonly FrameItem[], event: MouseEvent) => {
      const ids = frames.map((frame) => frame.id);
      const before = mannerOf(event) === 'alone' ? [] : latest.current.selection.chosen;
      onSelection({ chosen: new Set([...before, ...ids]), focus: ids[0] ?? null, anchor: ids[0] ?? null });
    },
    [onSelection],
  );
  const reachable = selection.focus ?? order[0];
  const shared: TilesShared = { model, selection, reachable, views, addressOf, onPress, onMark, onOpen, onChooseAll, toolsOf };

  return (
    <div ref={columnRef}>
      {rows.length > 0 ? (
        <div
          ref={grid}
          role="grid"
          aria-label="Frames"
          aria-multiselectable="true"
          aria-rowcount={rows.length}
          onFocus={(event) => {
            const id = event.target.closest<HTMLElement>('[data-frame]')?.dataset.frame;
            // However the focus came here, the keys start from where it is.
            if (id !== undefined && id !== selection.focus) onSelection({ ...selection, focus: id });
          }}
          onKeyDown={(event) => {
            // The buttons of a heading have keys of their own.
            if (!(event.target as Element).matches('[data-frame]')) return;
            pressInGrid(event, {
              order,
              rows: lines,
              gap: GAP,
              selection,
              change: (next) => {
                onSelection(next);
                if (next.focus !== null && next.focus !== selection.focus) focusSoon(next.focus);
              },
              open: onOpen,
              remove: onDelete,
              showKeys: onKeys,
            });
          }}
        >
          <VirtualRows
            ref={virtual}
            count={rows.length}
            layoutKey={`${width}/${rows.length}/${order.length}/${above}`}
            heightOf={(at) => rows[at]?.height ?? 0}
            keyOf={(at) => rows[at]?.key ?? String(at)}
            footHeight={FOOT}
          >
            {(at) => {
              const row = rows[at];
              return row ? <GridRowView row={row} at={at} shared={shared} /> : null;
            }}
          </VirtualRows>
        </div>
      ) : null}
    </div>
  );
}

/** A finger has no modifier keys, so each tap adds or takes away; a screen reader's press does the same. */
function mannerOf(event: MouseEvent): Manner {
  if (event.shiftKey) return 'range';
  const pointer = (event.nativeEvent as PointerEvent).pointerType;
  return event.ctrlKey || event.metaKey || (pointer !== 'mouse' && pointer !== 'pen') ? 'also' : 'alone';
}

/** Focuses a tile that may not be in the document yet: its row is scrolled to, then looked for until it is there. */
function useFocusOn(
  grid: React.RefObject<HTMLDivElement | null>,
  virtual: React.RefObject<VirtualRowsHandle | null>,
  { lines, order }: GridModel,
): (id: string) => void {
  const wanted = useRef<string | null>(null);
  return useCallback(
    (id: string) => {
      wanted.current = id;
      virtual.current?.scrollToRow(lines[rowOf(lines, order.indexOf(id))]?.row ?? 0);
      const look = (tries: number) => {
        if (wanted.current !== id) return;
        const tile = grid.current?.querySelector<HTMLElement>(`[data-frame="${id}"]`);
        tile?.focus({ preventScroll: true });
        // Not drawn yet, or still behind the large view.
        if (tries > 0 && (!tile || document.activeElement !== tile)) requestAnimationFrame(() => look(tries - 1));
      };
      requestAnimationFrame(() => look(30));
    },
    [grid, virtual, lines, order],
  );
}
