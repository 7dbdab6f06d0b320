import { cleanup, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { MemoryRouter, useLocation } from 'react-router-dom';
import { afterEach, expect, it } from 'vitest';
import { Filters, SearchField } from '../../client/src/components/ui/filters.tsx';
import { idOf, oneOf, useAddressFilters } from '../../client/src/lib/use-address-filters.ts';

afterEach(cleanup);

function List() {
  const { read, write } = useAddressFilters();
  const { search } = useLocation();
  return (
    <>
      <Filters label="Narrow the list">
        <SearchField label="Find" value={read('q')} onSearch={(q) => write({ q })} />
      </Filters>
      <button type="button" onClick={() => write({ q: null, kind: null })}>
        Show all
      </button>
      <output>{search}</output>
    </>
  );
}

const open = (address: string) =>
  render(
    <MemoryRouter initialEntries={[address]}>
      <List />
    </MemoryRouter>,
  );

it('puts what is typed into the address once the fingers rest, beside the other filters', async () => {
  open('/probes?kind=inductive');
  await userEvent.type(screen.getByRole('searchbox', { name: 'Find' }), 'sk-1');
  expect(await screen.findByText('?kind=inductive&q=sk-1')).toBeTruthy();
});

it('empties the field when the filters are cleared from elsewhere', async () => {
  open('/probes?q=zz&kind=inductive');
  const field = screen.getByRole<HTMLInputElement>('searchbox', { name: 'Find' });
  expect(field.value).toBe('zz');
  await userEvent.click(screen.getByRole('button', { name: 'Show all' }));
  expect(field.value).toBe('');
  expect(screen.getByRole('status').textContent).toBe('');
});

it('takes nothing from an address that it cannot mean', () => {
  expect(idOf('12')).toBe(12);
  expect(idOf('-1')).toBeUndefined();
  expect(idOf('1e3')).toBeUndefined();
  expect(oneOf(['fit', 'gone'] as const, 'fit')).toBe('fit');
  expect(oneOf(['fit', 'gone'] as const, 'fine')).toBeUndefined();
});
