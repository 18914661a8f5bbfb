import { useImperativeHandle, useLayoutEffect, useState, useSyncExternalStore, type ReactNode, type Ref } from 'react';
import { RowWindow, type RowLayout } from './row-window.ts';

export interface VirtualRowsHandle {
  /** Brings a row onto the screen with as little scrolling as possible, and into the document. */
  scrollToRow(index: number): void;
}

interface Props extends RowLayout {
  /** Draws a row; may be asked for one that has just gone, and draws nothing then. */
  children: (index: number) => ReactNode;
  /** Kept free at the lower edge of the window when scrolling to a row: a sticky foot. */
  footHeight?: number;
  ref?: Ref<VirtualRowsHandle>;
  className?: string;
}

/**
 * Rows of a list that scrolls with the window, of which only those near the screen are in the document. Our rows know
 * their heights beforehand, so a general library's estimates, 11 kB of the guest's sheet, would have nothing to do here.
 * The row that holds the focus stays in the document, so that the focus is not lost by scrolling.
 */
export function VirtualRows({ count, heightOf, keyOf, layoutKey, children, footHeight = 0, ref, className }: Props) {
  const [rows] = useState(() => new RowWindow());
  const { attach, watch } = rows;
  const { offsets, range } = useSyncExternalStore(rows.listen, rows.state);
  const [focused, setFocused] = useState<number | null>(null);
  useLayoutEffect(() => rows.arrange({ count, heightOf, keyOf, layoutKey }));
  useImperativeHandle(ref, () => ({ scrollToRow: (index) => rows.scrollTo(index, footHeight) }), [rows, footHeight]);

  const last = Math.min(range.last, count - 1);
  const shown = Array.from({ length: Math.max(0, last - range.first + 1) }, (_, at) => range.first + at);
  if (focused !== null && focused < count && !shown.includes(focused)) shown.push(focused);
  return (
    <div
      ref={attach}
      className={className}
      style={{ position: 'relative', height: offsets[offsets.length - 1] }}
      onFocus={(event) => {
        const row = event.target.closest<HTMLElement>('[data-index]');
        setFocused(row ? Number(row.dataset.index) : null);
      }}
      onBlur={() => setFocused(null)}
    >
      {shown.map((index) => (
        <div
          key={keyOf(index)}
          data-index={index}
          data-key={keyOf(index)}
          ref={watch}
          className="absolute inset-x-0 top-0"
          style={{ transform: `translateY(${offsets[index] ?? 0}px)` }}
        >
          {children(index)}
        </div>
      ))}
    </div>
  );
}
