import { Button } from '@radix-ui/themes';
import type { KeyboardEvent, ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { downloadCsv, toCsv } from '../lib/csv.ts';
import styles from './data-table.module.css';

export interface Column<Row> {
  key: string;
  head: string;
  cell: (row: Row) => ReactNode;
  /** Figures and money stand right. */
  align?: 'left' | 'right';
  /** The column's total or note in the last row. */
  foot?: ReactNode;
  /** The cell in the CSV; columns without it are left out there. */
  csv?: (row: Row) => string | number | null;
  /** Left out on a phone, where another cell says it in small. */
  narrow?: 'hide';
  /** Names the row for those who hear it; the first column unless told. */
  isRowHead?: boolean;
}

interface DataTableProps<Row> {
  /** Says what the table holds; shown above it unless `hideCaption`. */
  caption: string;
  hideCaption?: boolean;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  /** With a name, a CSV button stands under the table. */
  csvName?: string;
}

/** A table with a sticky head. Up and down move between the links and buttons of one column. */
export function DataTable<Row>(props: DataTableProps<Row>) {
  const { caption, hideCaption = false, columns, rows, rowKey, csvName } = props;
  const { t } = useTranslation();
  const hasFoot = columns.some((column) => column.foot !== undefined);
  const headKey = (columns.find((column) => column.isRowHead === true) ?? columns[0])?.key;
  const save = () => {
    const kept = columns.filter((column) => column.csv !== undefined);
    const lines = rows.map((row) => kept.map((column) => column.csv?.(row) ?? null));
    downloadCsv(`${csvName ?? 'table'}.csv`, toCsv([kept.map((column) => column.head), ...lines]));
  };
  return (
    <div className={styles.wrap}>
      {/* A wide table scrolls by itself; keyboards reach it because it takes the focus. */}
      <div className={styles.scroll} role="region" aria-label={caption} tabIndex={0}>
        <table className={styles.table} onKeyDown={moveByRow}>
          <caption className={hideCaption ? 'k-hidden' : styles.caption}>{caption}</caption>
          <thead>
            <tr>
              {columns.map((column) => (
                <th key={column.key} scope="col" className={lookOf(column)}>
                  {column.head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <tr key={rowKey(row)}>
                {columns.map((column) =>
                  column.key === headKey ? (
                    <th key={column.key} scope="row" className={lookOf(column)}>
                      {column.cell(row)}
                    </th>
                  ) : (
                    <td key={column.key} className={lookOf(column)}>
                      {column.cell(row)}
                    </td>
                  ),
                )}
              </tr>
            ))}
          </tbody>
          {hasFoot && (
            <tfoot>
              <tr>
                {columns.map((column) => (
                  <td key={column.key} className={lookOf(column)}>
                    {column.foot}
                  </td>
                ))}
              </tr>
            </tfoot>
          )}
        </table>
      </div>
      {csvName !== undefined && rows.length > 0 && (
        <Button type="button" variant="soft" color="gray" size="2" className="k-no-print" onClick={save}>
          {t('table.csv')}
        </Button>
      )}
    </div>
  );
}

function lookOf<Row>(column: Column<Row>): string {
  return `${styles[column.align ?? 'left']} ${column.narrow === 'hide' ? styles.narrowHide : ''}`;
}

/** Arrow up and down: from a link or button to the one in the same column of the next row that has one. */
function moveByRow(event: KeyboardEvent<HTMLTableElement>): void {
  if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return;
  const from = (event.target as HTMLElement).closest('td, th');
  const row = from?.parentElement;
  if (!(from instanceof HTMLTableCellElement) || !(row instanceof HTMLTableRowElement)) return;
  const step = event.key === 'ArrowDown' ? 'nextElementSibling' : 'previousElementSibling';
  for (let next = row[step]; next instanceof HTMLTableRowElement; next = next[step]) {
    const target = next.cells[from.cellIndex]?.querySelector<HTMLElement>('a[href], button:not(:disabled)');
    if (target === null || target === undefined) continue;
    event.preventDefault();
    target.focus();
    return;
  }
}
