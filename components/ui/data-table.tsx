'use client';

import { type ReactNode, useMemo, useState } from 'react';
import { TextField } from './field';

export interface Column<Row> {
  key: string;
  header: string;
  render: (row: Row) => ReactNode;
  /** Makes the column sortable. */
  sortValue?: (row: Row) => string | number;
  align?: 'left' | 'right';
  /** Hidden on narrow screens. */
  wideOnly?: boolean;
}

interface DataTableProps<Row> {
  caption: string;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowId: (row: Row) => string;
  /** The text that the search box looks through. */
  searchText?: (row: Row) => string;
  initialSort?: { key: string; descending: boolean };
  /** Further filters, beside the search box. */
  filters?: ReactNode;
  empty?: ReactNode;
}

type Sort = { key: string; descending: boolean } | undefined;

function sortRows<Row>(rows: readonly Row[], columns: readonly Column<Row>[], sort: Sort): readonly Row[] {
  const value = columns.find((column) => column.key === sort?.key)?.sortValue;
  if (!sort || !value) return rows;
  const sign = sort.descending ? -1 : 1;
  return [...rows].sort((a, b) => {
    const [x, y] = [value(a), value(b)];
    if (typeof x === 'number' && typeof y === 'number') return sign * (x - y);
    return sign * String(x).localeCompare(String(y), 'en', { numeric: true });
  });
}

/** A list as a table: search, sort by any column that can be sorted, and an honest empty state. */
export function DataTable<Row>(props: DataTableProps<Row>) {
  const { caption, columns, rows, rowId, searchText, initialSort, filters, empty } = props;
  const [query, setQuery] = useState('');
  const [sort, setSort] = useState<Sort>(initialSort);
  const shown = useMemo(() => {
    const words = query.toLowerCase().split(/\s+/).filter(Boolean);
    const found = searchText
      ? rows.filter((row) => {
          const text = searchText(row).toLowerCase();
          return words.every((word) => text.includes(word));
        })
      : rows;
    return sortRows(found, columns, sort);
  }, [rows, columns, query, sort, searchText]);

  if (rows.length === 0 && empty) return <>{empty}</>;
  const toggle = (key: string) =>
    setSort((now) => ({ key, descending: now?.key === key ? !now.descending : false }));
  return (
    <div>
      {searchText || filters ? (
        <div className="mb-3 flex flex-wrap items-end gap-3">
          {searchText ? (
            <TextField
              label={`Search ${caption.toLowerCase()}`}
              labelHidden
              type="search"
              placeholder="Search"
              className="w-64 max-w-full"
              value={query}
              onChange={(event) => setQuery(event.target.value)}
            />
          ) : null}
          {filters}
          <p className="ml-auto self-center text-sm text-quiet" role="status">
            {shown.length === rows.length ? `${rows.length} in all` : `${shown.length} of ${rows.length}`}
          </p>
        </div>
      ) : null}
      <section className="overflow-x-auto rounded-md border border-rule bg-surface" aria-label={caption}>
        <table className="w-full border-collapse text-sm">
          <caption className="sr-only">{caption}</caption>
          <thead>
            <tr>
              {columns.map((column) => (
                <HeaderCell key={column.key} column={column} sort={sort} onToggle={toggle} />
              ))}
            </tr>
          </thead>
          <tbody>
            {shown.map((row) => (
              <tr key={rowId(row)} className="border-t border-rule hover:bg-paper">
                {columns.map((column) => (
                  <td key={column.key} className={`px-3 py-2 align-middle ${cellClass(column)}`}>
                    {column.render(row)}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
        {shown.length === 0 ? (
          <p className="px-3 py-6 text-center text-sm text-quiet">Nothing matches.</p>
        ) : null}
      </section>
    </div>
  );
}

const cellClass = (column: { align?: 'left' | 'right'; wideOnly?: boolean }) =>
  `${column.align === 'right' ? 'text-right' : 'text-left'} ${column.wideOnly ? 'hidden md:table-cell' : ''}`;

interface HeaderCellProps<Row> {
  column: Column<Row>;
  sort: Sort;
  onToggle: (key: string) => void;
}

function HeaderCell<Row>({ column, sort, onToggle }: HeaderCellProps<Row>) {
  const active = sort?.key === column.key;
  const direction = sort?.descending ? 'descending' : 'ascending';
  return (
    <th
      scope="col"
      aria-sort={active ? direction : undefined}
      className={`px-3 py-2 text-xs font-semibold tracking-wide text-quiet ${cellClass(column)}`}
    >
      {column.sortValue ? (
        <button
          type="button"
          className="min-h-6 font-semibold hover:text-ink"
          onClick={() => onToggle(column.key)}
        >
          {column.header}
          <span aria-hidden="true">{active ? (sort?.descending ? ' ↓' : ' ↑') : ''}</span>
        </button>
      ) : (
        column.header
      )}
    </th>
  );
}
