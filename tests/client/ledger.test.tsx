import { cleanup, render, screen, within } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { MemoryRouter } from 'react-router-dom';
import { afterEach, expect, it } from 'vitest';
import { Figure, NameCell } from '../../client/src/components/ui/figure.tsx';
import type { LedgerColumn, LedgerSort } from '../../client/src/components/ui/ledger-parts.tsx';
import { groupRows, Ledger } from '../../client/src/components/ui/ledger.tsx';

afterEach(cleanup);

interface Point {
  id: number;
  name: string;
  area: string;
  value: string;
}

const points: Point[] = [
  { id: 1, name: 'Intake, open sea', area: 'Seawater feed', value: '49.82' },
  { id: 2, name: 'Permeate, train A', area: 'Permeate', value: '212.4' },
  { id: 3, name: 'Feed, train A', area: 'Seawater feed', value: '405' },
];

const columns: LedgerColumn<Point>[] = [
  {
    key: 'name',
    head: 'Point',
    width: '212px',
    isSortable: true,
    cell: (row) => <NameCell name={row.name} />,
  },
  { key: 'value', head: 'Value', width: '1fr', cell: (row) => <Figure text={row.value} /> },
];

function PointLedger({ rows = points }: { rows?: Point[] }) {
  const [sort, setSort] = useState<LedgerSort | null>(null);
  const sorted = sort
    ? [...rows].sort((a, b) => a.name.localeCompare(b.name) * (sort.direction === 'ascending' ? 1 : -1))
    : rows;
  return (
    <MemoryRouter>
      <Ledger
        label="Measuring points"
        columns={columns}
        rows={sorted}
        rowKey={(row) => row.id}
        rowHref={(row) => `/probes/${row.id}`}
        rowState={(row) => (row.id === 3 ? 'held' : 'plain')}
        sort={sort}
        onSort={setSort}
        {...(sort ? {} : { groupOf: (row: Point) => row.area })}
        empty={<p>No point is registered yet.</p>}
      />
    </MemoryRouter>
  );
}

const names = () =>
  screen
    .getAllByRole('row')
    .map((row) => within(row).queryByRole('link')?.textContent)
    .filter(Boolean);

it('is a table to a screen reader: name, heads, rows and cells', () => {
  render(<PointLedger />);
  const table = screen.getByRole('table', { name: 'Measuring points' });
  expect(
    within(table)
      .getAllByRole('columnheader')
      .map((head) => head.textContent),
  ).toEqual(['Point', 'Value']);
  const row = within(table).getByText('Permeate, train A').closest('[role=row]');
  expect(within(row as HTMLElement).getAllByRole('cell')).toHaveLength(2);
});

it('stands rows under the name of their group, in the order given', () => {
  render(<PointLedger />);
  expect(names()).toEqual(['Intake, open sea', 'Feed, train A', 'Permeate, train A']);
  expect(screen.getByRole('rowgroup', { name: 'Seawater feed' })).toBeTruthy();
});

it('makes the name of each row the link to its page', () => {
  render(<PointLedger />);
  expect(screen.getByRole('link', { name: 'Feed, train A' }).getAttribute('href')).toBe('/probes/3');
});

it('sorts by a press on the head and says in which direction', async () => {
  render(<PointLedger />);
  const head = () => screen.getByRole('columnheader', { name: 'Point' });
  expect(head().getAttribute('aria-sort')).toBe('none');
  await userEvent.click(screen.getByRole('button', { name: 'Point' }));
  expect(head().getAttribute('aria-sort')).toBe('ascending');
  expect(names()).toEqual(['Feed, train A', 'Intake, open sea', 'Permeate, train A']);
  await userEvent.click(screen.getByRole('button', { name: 'Point' }));
  expect(head().getAttribute('aria-sort')).toBe('descending');
  expect(names()[0]).toBe('Permeate, train A');
});

it('shows the empty face instead of a head over nothing, and rows when they come', () => {
  const { rerender } = render(<PointLedger rows={[]} />);
  expect(screen.getByText('No point is registered yet.')).toBeTruthy();
  expect(screen.queryByRole('table')).toBeNull();
  rerender(<PointLedger />);
  expect(screen.getAllByRole('link')).toHaveLength(3);
});

it('aligns figures on the point: what stands before it and after it in boxes of their own', () => {
  const { container } = render(<Figure text="49.82" whole={5} fraction={3} />);
  expect(container.querySelector('.fig-whole')?.textContent).toBe('49');
  expect(container.querySelector('.fig-fraction')?.textContent).toBe('.82');
});

it('keeps groups in the order of their first row', () => {
  expect(groupRows(points, (row) => row.area).map((group) => [group.name, group.rows.length])).toEqual([
    ['Seawater feed', 2],
    ['Permeate', 1],
  ]);
});
