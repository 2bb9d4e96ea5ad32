import { screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, expect, it, vi } from 'vitest';
import { renderInApp } from '../test/render.tsx';
import { DataTable, type Column } from './data-table.tsx';

interface Row {
  id: string;
  name: string;
  cents: number;
}

const rows: Row[] = [
  { id: '1', name: 'Line 1', cents: 100 },
  { id: '2', name: '=Line 2', cents: 200 },
  { id: '3', name: 'Line 3', cents: 300 },
];
const columns: Column<Row>[] = [
  {
    key: 'name',
    head: 'Line',
    cell: (row) => <a href={`#${row.id}`}>{row.name}</a>,
    csv: (row) => row.name,
    foot: 'Sum',
  },
  {
    key: 'cents',
    head: 'Amount',
    cell: (row) => row.cents,
    align: 'right',
    csv: (row) => row.cents,
    foot: '600',
  },
];

afterEach(() => vi.restoreAllMocks());

it('is a table with headers, a caption and a foot', () => {
  renderInApp(<DataTable caption="Lines" columns={columns} rows={rows} rowKey={(row) => row.id} />);
  const table = screen.getByRole('table', { name: 'Lines' });
  expect(
    within(table)
      .getAllByRole('columnheader')
      .map((cell) => cell.textContent),
  ).toEqual(['Line', 'Amount']);
  expect(within(table).getAllByRole('rowheader')).toHaveLength(3);
  expect(within(table).getByText('600')).toBeInTheDocument();
});

it('moves down and up a column by the arrow keys', async () => {
  renderInApp(<DataTable caption="Lines" columns={columns} rows={rows} rowKey={(row) => row.id} />);
  screen.getByRole('link', { name: 'Line 1' }).focus();
  await userEvent.keyboard('{ArrowDown}{ArrowDown}{ArrowDown}');
  expect(screen.getByRole('link', { name: 'Line 3' })).toHaveFocus();
  await userEvent.keyboard('{ArrowUp}');
  expect(screen.getByRole('link', { name: '=Line 2' })).toHaveFocus();
});

it('saves its rows as CSV, formulas disarmed', async () => {
  const parts: Blob[] = [];
  vi.spyOn(URL, 'createObjectURL').mockImplementation((blob) => {
    parts.push(blob as Blob);
    return 'blob:x';
  });
  renderInApp(
    <DataTable caption="Lines" columns={columns} rows={rows} rowKey={(row) => row.id} csvName="lines" />,
  );
  await userEvent.click(screen.getByRole('button', { name: 'Save as CSV' }));
  expect(await parts[0]?.text()).toContain("Line,Amount\r\nLine 1,100\r\n'=Line 2,200\r\nLine 3,300\r\n");
});
