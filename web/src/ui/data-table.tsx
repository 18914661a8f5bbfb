import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { joinClasses } from './join-classes.ts';

export interface Column<T> {
  /** Also the name by which it is sorted. */
  key: string;
  words: string;
  cell: (row: T) => ReactNode;
  /** right: figures. */
  align?: 'left' | 'right';
  /** A CSS width; without one the column takes what its content needs. */
  width?: string;
  sortable?: boolean;
}

export interface Sorting {
  key: string;
  down: boolean;
}

interface Props<T> {
  /** Read out before the table. */
  caption: string;
  columns: Column<T>[];
  rows: T[];
  rowKey: (row: T) => string;
  sorting?: Sorting | undefined;
  onSort?: (sorting: Sorting) => void;
  className?: string;
}

/** Rows under lettered heads. Scrolls sideways by itself where the page is too narrow for it. */
export function DataTable<T>({ caption, columns, rows, rowKey, sorting, onSort, className }: Props<T>) {
  return (
    <div className={joinClasses('overflow-x-auto border border-ink bg-sheet', className)} tabIndex={0} role="region" aria-label={caption}>
      <table className="w-full border-collapse text-left">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr>
            {columns.map((column) => (
              <HeadCell key={column.key} column={column} sorting={sorting} onSort={onSort} />
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={rowKey(row)} className="border-t border-hair">
              {columns.map((column) => (
                <td
                  key={column.key}
                  className={joinClasses('px-2.5 py-2 align-middle lg:px-3.5', column.align === 'right' && 'text-right')}
                >
                  {column.cell(row)}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface HeadProps<T> {
  column: Column<T>;
  sorting: Sorting | undefined;
  onSort: ((sorting: Sorting) => void) | undefined;
}

function HeadCell<T>({ column, sorting, onSort }: HeadProps<T>) {
  const { t } = useTranslation();
  const active = sorting?.key === column.key;
  const sort = active ? (sorting.down ? 'descending' : 'ascending') : undefined;
  return (
    <th
      scope="col"
      aria-sort={sort}
      style={column.width ? { width: column.width } : undefined}
      className={joinClasses('lettering px-2.5 py-2 lg:px-3.5 font-normal whitespace-nowrap', column.align === 'right' && 'text-right')}
    >
      {column.sortable && onSort ? (
        <button
          type="button"
          className="target -my-1 inline-flex items-center gap-1 underline-offset-4 hover:underline"
          title={active ? t(sorting.down ? 'ui.sortedDown' : 'ui.sortedUp') : undefined}
          onClick={() => onSort({ key: column.key, down: active ? !sorting.down : false })}
        >
          {column.words}
          <span aria-hidden="true" className="w-2">
            {active ? (sorting.down ? '↓' : '↑') : ''}
          </span>
        </button>
      ) : (
        column.words
      )}
    </th>
  );
}
