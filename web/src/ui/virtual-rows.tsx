import { defaultRangeExtractor, useWindowVirtualizer, type Range } from '@tanstack/react-virtual';
import { useCallback, useImperativeHandle, useLayoutEffect, useRef, useState, type ReactNode, type Ref } from 'react';

export interface VirtualRowsHandle {
  /** Brings a row onto the screen with as little scrolling as possible, and into the document. */
  scrollToRow(index: number): void;
}

interface Props {
  count: number;
  /** The height of a row in CSS pixels before it is drawn; exact where it can be, it is measured afterwards. */
  heightOf: (index: number) => number;
  keyOf: (index: number) => string;
  children: (index: number) => ReactNode;
  /** Rows drawn beyond the edges of the screen. */
  overscan?: number;
  /** Kept free at the lower edge of the window when scrolling to a row: a sticky foot. */
  footHeight?: number;
  /** Any value that makes the estimated heights new: the width of the column. */
  layoutKey: string | number;
  ref?: Ref<VirtualRowsHandle>;
  className?: string;
}

/**
 * Rows of a list that scrolls with the window, of which only those near the screen are in the document. The row that
 * holds the focus stays in it, so that the focus is not lost by scrolling.
 */
export function VirtualRows({ count, heightOf, keyOf, children, overscan = 3, footHeight = 0, layoutKey, ref, className }: Props) {
  const list = useRef<HTMLDivElement>(null);
  const focused = useRef<number | null>(null);
  const [offset, setOffset] = useState(0);

  useLayoutEffect(() => {
    const top = list.current ? list.current.getBoundingClientRect().top + window.scrollY : 0;
    setOffset(Math.round(top));
  }, [layoutKey]);

  const rangeExtractor = useCallback((range: Range) => {
    const rows = defaultRangeExtractor(range);
    const kept = focused.current;
    if (kept === null || kept >= range.count || rows.includes(kept)) return rows;
    return [...rows, kept].sort((one, other) => one - other);
  }, []);

  const virtualizer = useWindowVirtualizer({
    count,
    estimateSize: heightOf,
    getItemKey: keyOf,
    overscan,
    scrollMargin: offset,
    scrollPaddingStart: 16,
    scrollPaddingEnd: footHeight + 16,
    rangeExtractor,
  });

  useLayoutEffect(() => virtualizer.measure(), [virtualizer, layoutKey]);
  useImperativeHandle(ref, () => ({ scrollToRow: (index) => virtualizer.scrollToIndex(index, { align: 'auto' }) }), [virtualizer]);

  const noteFocus = (target: EventTarget) => {
    const row = target instanceof Element ? target.closest<HTMLElement>('[data-index]') : null;
    focused.current = row ? Number(row.dataset.index) : null;
  };

  return (
    <div
      ref={list}
      className={className}
      style={{ position: 'relative', height: virtualizer.getTotalSize() }}
      onFocus={(event) => noteFocus(event.target)}
      onBlur={() => (focused.current = null)}
    >
      {virtualizer.getVirtualItems().map((row) => (
        <div
          key={row.key}
          data-index={row.index}
          ref={virtualizer.measureElement}
          className="absolute inset-x-0 top-0"
          style={{ transform: `translateY(${row.start - offset}px)` }}
        >
          {children(row.index)}
        </div>
      ))}
    </div>
  );
}
