import { useCallback, useEffect, useImperativeHandle, useMemo, useRef, type MouseEvent, type Ref } from 'react';
import type { FrameItem } from '../../../../api/contract/frames.ts';
import { justify, type JustifiedRow } from '../../ui/justify.ts';
import { useWidth } from '../../ui/use-width.ts';
import { VirtualRows, type VirtualRowsHandle } from '../../ui/virtual-rows.tsx';
import { CAPTION, FrameTile } from './frame-tile.tsx';
import { rowOf } from './row-places.ts';
import { choose, type Manner, type Selection } from './selection.ts';
import { pressInGrid } from './use-grid-keys.ts';

const GAP = 12;
const ROW_HEIGHT = 190;
/** The selection bar that stands over the lower edge. */
const FOOT = 72;

export interface FrameGridHandle {
  /** Scrolls to a frame and gives it the focus. */
  focusFrame(id: string): void;
}

interface Props {
  frames: readonly FrameItem[];
  selection: Selection;
  onSelection: (selection: Selection) => void;
  views: ReadonlyMap<string, { title: string; number: number }>;
  /** Where a frame is shown large. */
  addressOf: (id: string) => string;
  onOpen: (id: string) => void;
  onDelete: () => void;
  onKeys: () => void;
  /** Anything that moves the grid down or up the page when it changes. */
  above: string | number;
  ref?: Ref<FrameGridHandle>;
}

/** Any number of frames in justified rows, of which one is reached by Tab and the others by the arrows. */
export function FrameGrid({ frames, selection, onSelection, views, addressOf, onOpen, onDelete, onKeys, above, ref }: Props) {
  const [columnRef, width] = useWidth();
  const order = useMemo(() => frames.map((frame) => frame.id), [frames]);
  const rows = useMemo(() => rowsOf(frames, width), [frames, width]);
  const virtual = useRef<VirtualRowsHandle>(null);
  const grid = useRef<HTMLDivElement>(null);
  const latest = useRef({ selection, order });
  useEffect(() => {
    latest.current = { selection, order };
  });
  const focusSoon = useFocusOn(grid, virtual, rows, order);
  useImperativeHandle(ref, () => ({ focusFrame: focusSoon }), [focusSoon]);

  const pick = useCallback(
    (id: string, manner: Manner) => onSelection(choose(latest.current.selection, latest.current.order, id, manner)),
    [onSelection],
  );
  const onPress = useCallback((id: string, event: MouseEvent) => pick(id, mannerOf(event)), [pick]);
  const onMark = useCallback((id: string) => pick(id, 'also'), [pick]);
  const reachable = selection.focus ?? order[0];

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
          onKeyDown={(event) =>
            pressInGrid(event, {
              order,
              rows,
              gap: GAP,
              selection,
              change: (next) => {
                onSelection(next);
                if (next.focus !== null && next.focus !== selection.focus) focusSoon(next.focus);
              },
              open: onOpen,
              remove: onDelete,
              showKeys: onKeys,
            })
          }
        >
          <VirtualRows
            ref={virtual}
            count={rows.length}
            layoutKey={`${width}/${frames.length}/${above}`}
            heightOf={(at) => (rows[at]?.height ?? 0) + CAPTION + GAP}
            keyOf={(at) => order[rows[at]?.first ?? 0] ?? String(at)}
            footHeight={FOOT}
          >
            {(at) => {
              const row = rows[at];
              if (!row) return null;
              return (
                <div role="row" aria-rowindex={at + 1} className="flex" style={{ gap: GAP, height: row.height + CAPTION + GAP }}>
                  {frames.slice(row.first, row.first + row.widths.length).map((frame, place) => (
                    <FrameTile
                      key={frame.id}
                      frame={frame}
                      width={row.widths[place] ?? 0}
                      height={row.height}
                      chosen={selection.chosen.has(frame.id)}
                      reachable={frame.id === reachable}
                      view={frame.viewId === null ? undefined : views.get(frame.viewId)}
                      address={addressOf(frame.id)}
                      onPress={onPress}
                      onMark={onMark}
                      onOpen={onOpen}
                    />
                  ))}
                </div>
              );
            }}
          </VirtualRows>
        </div>
      ) : null}
    </div>
  );
}

function rowsOf(frames: readonly FrameItem[], width: number): JustifiedRow[] {
  // Without a size (a frame that could not be read) a tile takes the commonest proportion, not a square hole.
  const pictures = frames.map((frame) => (frame.width > 0 && frame.height > 0 ? frame : { width: 3, height: 2 }));
  return width === 0 ? [] : justify(pictures, { width, rowHeight: ROW_HEIGHT, gap: GAP });
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
  rows: readonly JustifiedRow[],
  order: readonly string[],
): (id: string) => void {
  const wanted = useRef<string | null>(null);
  return useCallback(
    (id: string) => {
      wanted.current = id;
      virtual.current?.scrollToRow(rowOf(rows, order.indexOf(id)));
      const look = (tries: number) => {
        if (wanted.current !== id) return;
        const tile = grid.current?.querySelector<HTMLElement>(`[data-frame="${id}"]`);
        tile?.focus({ preventScroll: true });
        // Not drawn yet, or still behind the large view.
        if (tries > 0 && (!tile || document.activeElement !== tile)) requestAnimationFrame(() => look(tries - 1));
      };
      requestAnimationFrame(() => look(30));
    },
    [grid, virtual, rows, order],
  );
}
