import { useMemo, type ReactNode, type Ref } from 'react';
import { justify, stack, type Proportioned } from './justify.ts';
import { useWidth } from './use-width.ts';
import { VirtualRows, type VirtualRowsHandle } from './virtual-rows.tsx';

interface Props<T extends Proportioned> {
  pictures: readonly T[];
  keyOf: (picture: T) => string;
  /** Draws one picture with what belongs to it, in a box `width` wide whose picture is `height` high. */
  children: (picture: T, index: number, box: { width: number; height: number }) => ReactNode;
  /** The height rows aim at. */
  rowHeight?: number;
  gap?: number;
  /** Room below each row for captions. */
  captionHeight?: number;
  /** Below this width of the column each picture takes a row of its own. */
  stackBelow?: number;
  ref?: Ref<VirtualRowsHandle>;
  className?: string;
}

/** Any number of pictures in justified rows that scroll with the window; 10,000 are no more work than a screenful. */
export function JustifiedRows<T extends Proportioned>({
  pictures,
  keyOf,
  children,
  rowHeight = 200,
  gap = 12,
  captionHeight = 0,
  stackBelow = 0,
  ref,
  className,
}: Props<T>) {
  const [columnRef, columnWidth] = useWidth();
  const rows = useMemo(() => {
    if (columnWidth === 0) return [];
    if (columnWidth < stackBelow) return stack(pictures, columnWidth, columnWidth * 1.5);
    return justify(pictures, { width: columnWidth, rowHeight, gap });
  }, [pictures, columnWidth, rowHeight, gap, stackBelow]);

  return (
    <div ref={columnRef} className={className}>
      <VirtualRows
        ref={ref}
        count={rows.length}
        layoutKey={`${columnWidth}/${rowHeight}/${pictures.length}`}
        heightOf={(at) => (rows[at]?.height ?? 0) + captionHeight + gap}
        keyOf={(at) => String(rows[at]?.first ?? at)}
      >
        {(at) => {
          const row = rows[at];
          if (!row) return null;
          return (
            <div className="flex" style={{ gap, paddingBottom: gap, height: row.height + captionHeight + gap }}>
              {row.widths.map((width, place) => {
                const index = row.first + place;
                const picture = pictures[index];
                if (!picture) return null;
                return (
                  <div key={keyOf(picture)} className="shrink-0" style={{ width }}>
                    {children(picture, index, { width, height: row.height })}
                  </div>
                );
              })}
            </div>
          );
        }}
      </VirtualRows>
    </div>
  );
}
