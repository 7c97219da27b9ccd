import clsx from 'clsx';
import NextLink from 'next/link';
import type { ReactNode } from 'react';

export interface Column<Row> {
  key: string;
  label: string;
  cell: (row: Row) => ReactNode;
  /** `end` for figures. */
  align?: 'start' | 'end';
  /** The column that names the row; exactly one, else the first. */
  isHead?: boolean;
  /** Address of this list sorted by this column in the given direction; leave out where sorting is not offered. */
  sortHref?: (direction: 'asc' | 'desc') => string;
  /** Left out of the stacked form on small screens. */
  wideOnly?: boolean;
  /** Classes for the column's cells, such as a width. */
  className?: string;
}

export interface DataTableProps<Row> {
  /** What the table lists; read by screen readers, shown with `showCaption`. */
  caption: string;
  showCaption?: boolean;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  sort?: { key: string; direction: 'asc' | 'desc' };
  /** Below 640 px a row becomes a small card (`stack`) or the table scrolls inside its frame (`scroll`). */
  narrow?: 'stack' | 'scroll';
  /** Rows of at least 48 px, for production pages. */
  roomy?: boolean;
  /** Shown when there are no rows. */
  empty?: ReactNode;
}

/** A dense list with ruled rows and tabular figures; explicit roles keep it a table while its cells are stacked. */
export function DataTable<Row>(props: DataTableProps<Row>) {
  const { caption, showCaption, columns, rows, rowKey, sort, narrow = 'stack', roomy, empty } = props;
  if (rows.length === 0 && empty) return <>{empty}</>;
  const stack = narrow === 'stack';
  const head = columns.find((column) => column.isHead) ?? columns[0];
  return (
    <div
      className={clsx('border border-rule bg-sheet', stack ? 'sm:overflow-x-auto' : 'overflow-x-auto')}
      {...(stack ? {} : { role: 'region', 'aria-label': caption, tabIndex: 0 })}
    >
      <table role="table" className={clsx('w-full border-collapse text-base', stack && 'max-sm:block')}>
        <caption className={showCaption ? 'px-3 py-2 text-left text-sm text-slate' : 'sr-only'}>
          {caption}
        </caption>
        <thead role="rowgroup" className={stack ? 'max-sm:sr-only' : undefined}>
          <tr role="row" className="border-b border-ink">
            {columns.map((column) => (
              <HeadCell key={column.key} column={column} sort={sort} />
            ))}
          </tr>
        </thead>
        <tbody role="rowgroup" className={stack ? 'max-sm:block' : undefined}>
          {rows.map((row) => (
            <tr
              key={rowKey(row)}
              role="row"
              className={clsx(
                'border-b border-rule last:border-b-0 hover:bg-paper',
                stack && 'max-sm:flex max-sm:flex-col max-sm:px-3 max-sm:py-2.5',
              )}
            >
              {columns.map((column) => {
                const Cell = column === head ? 'th' : 'td';
                return (
                  <Cell
                    key={column.key}
                    role={column === head ? 'rowheader' : 'cell'}
                    scope={column === head ? 'row' : undefined}
                    data-label={column.label}
                    className={clsx(
                      'px-3 align-top font-normal tabular-nums',
                      roomy ? 'py-3.5' : 'py-2',
                      column.align === 'end' ? 'text-right' : 'text-left',
                      stack && stackedCell(column === head),
                      stack && column.wideOnly && 'max-sm:hidden!',
                      column.className,
                    )}
                  >
                    {column.cell(row)}
                  </Cell>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function stackedCell(isHead: boolean): string {
  return isHead
    ? 'max-sm:order-first max-sm:block max-sm:w-auto max-sm:p-0 max-sm:pb-1 max-sm:text-left'
    : 'max-sm:flex max-sm:w-auto max-sm:justify-between max-sm:gap-4 max-sm:px-0 max-sm:py-0.5 max-sm:text-right max-sm:text-sm max-sm:before:content-[attr(data-label)] max-sm:before:text-slate max-sm:before:text-left';
}

function HeadCell<Row>({ column, sort }: { column: Column<Row>; sort: DataTableProps<Row>['sort'] }) {
  const sorted = sort?.key === column.key ? sort.direction : null;
  const next = sorted === 'asc' ? 'desc' : 'asc';
  return (
    <th
      role="columnheader"
      scope="col"
      aria-sort={
        sorted ? (sorted === 'asc' ? 'ascending' : 'descending') : column.sortHref ? 'none' : undefined
      }
      className={clsx(
        'px-3 py-1 align-middle font-mono text-label font-medium text-slate uppercase',
        column.align === 'end' ? 'text-right' : 'text-left',
        column.className,
      )}
    >
      {column.sortHref ? (
        <NextLink
          href={column.sortHref(next)}
          scroll={false}
          className={clsx(
            'inline-flex min-h-6 items-center gap-1 text-inherit no-underline hover:text-ink',
            sorted && 'text-ink',
          )}
        >
          {column.label}
          <span aria-hidden className={sorted ? '' : 'opacity-40'}>
            {sorted === 'desc' ? '↓' : '↑'}
          </span>
        </NextLink>
      ) : (
        column.label
      )}
    </th>
  );
}
