import type { ReactNode } from 'react';
import { joinClasses } from './join-classes.ts';

export interface Cell {
  label: string;
  value: ReactNode;
  /** How wide the cell is beside the others; 1 where not given. */
  share?: number;
  /** Left out on phones, where room is short. */
  wideOnly?: boolean;
}

interface Props {
  cells: Cell[];
  /** Drawn below the cells within the same frame: the step bar. */
  children?: ReactNode;
  className?: string;
}

/** The title block of a drawing: labelled cells in one row, three abreast on a tablet, two on a phone. */
export function TitleBlock({ cells, children, className }: Props) {
  const columns = cells.map((cell) => `minmax(0, ${cell.share ?? 1}fr)`).join(' ');
  return (
    <div className={joinClasses('border border-ink bg-sheet', className)}>
      <dl
        className="flex flex-wrap overflow-hidden lg:grid lg:grid-cols-(--columns)"
        style={{ '--columns': columns } as React.CSSProperties}
      >
        {cells.map((cell) => (
          <div
            key={cell.label}
            className={joinClasses(
              '-mt-px -ml-px min-w-0 grow basis-2/5 border-t border-l border-line px-3 py-2 md:basis-[30%] md:px-3.5',
              cell.wideOnly && 'hidden md:block',
            )}
          >
            <dt className="lettering">{cell.label}</dt>
            <dd className="font-bold wrap-break-word">{cell.value}</dd>
          </div>
        ))}
      </dl>
      {children}
    </div>
  );
}
