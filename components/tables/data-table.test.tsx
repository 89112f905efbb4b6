import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { DataTable } from './data-table';
import type { Column, Row } from './columns';
import { StaticTable } from './static-table';

const columns: Column<'code' | 'dose' | 'state'>[] = [
  { key: 'code', header: 'Code', kind: 'code', rowHeader: true },
  { key: 'dose', header: 'Dose', unit: 'mg', kind: 'number' },
  { key: 'state', header: 'State', kind: 'state' },
];
const rows: Row<'code' | 'dose' | 'state'>[] = [
  { id: '1', values: { code: 'WELL-10', dose: '9', state: 'open' } },
  {
    id: '2',
    values: { code: 'WELL-2', dose: '10.5', state: 'halted' },
    content: { code: <a href="/x">WELL-2</a> },
  },
  { id: '3', values: { code: 'WELL-3', dose: null, state: 'in-review' } },
];
const table = <DataTable caption="Trials" columns={columns} rows={rows} what="trials" csvName="trials" />;
const codes = () => screen.getAllByRole('rowheader').map(({ textContent }) => textContent);

function textOf(blob: Blob | undefined): Promise<unknown> {
  if (!blob) throw new Error('Nothing was exported.');
  return new Promise((resolve) => {
    const reader = new FileReader();
    reader.onload = () => resolve(reader.result);
    reader.readAsText(blob);
  });
}

afterEach(() => vi.unstubAllGlobals());

describe('a table of data', { timeout: 20_000 }, () => {
  it('is sorted by its headers, numbers by size, empty cells last either way', async () => {
    const user = userEvent.setup({ delay: null });
    render(table);
    expect(codes()).toEqual(['WELL-10', 'WELL-2', 'WELL-3']);
    const dose = screen.getByRole('columnheader', { name: 'Dose, mg' });
    await user.click(within(dose).getByRole('button'));
    expect(dose).toHaveAttribute('aria-sort', 'ascending');
    expect(codes()).toEqual(['WELL-10', 'WELL-2', 'WELL-3']);
    await user.click(within(dose).getByRole('button'));
    expect(dose).toHaveAttribute('aria-sort', 'descending');
    expect(codes()).toEqual(['WELL-2', 'WELL-10', 'WELL-3']);
    await user.click(within(screen.getByRole('columnheader', { name: 'Code' })).getByRole('button'));
    expect(codes()).toEqual(['WELL-2', 'WELL-3', 'WELL-10']);
  });

  it('is searched by what is read, and says how many are left', async () => {
    const user = userEvent.setup({ delay: null });
    render(table);
    await user.type(screen.getByLabelText('Search trials'), 'in review');
    expect(codes()).toEqual(['WELL-3']);
    expect(screen.getByRole('status')).toHaveTextContent('1 of 3 trials');
    await user.type(screen.getByLabelText('Search trials'), 'x');
    expect(screen.getByText(/No trials match/)).toBeInTheDocument();
    await user.click(screen.getByRole('button', { name: 'Show all' }));
    expect(codes()).toHaveLength(3);
  });

  it('shows the columns chosen, and keeps those that name the rows', async () => {
    const user = userEvent.setup({ delay: null });
    render(table);
    await user.click(screen.getByRole('button', { name: 'Columns' }));
    expect(screen.queryByRole('checkbox', { name: 'Code' })).toBeNull();
    await user.click(screen.getByRole('checkbox', { name: 'Dose' }));
    expect(screen.queryByRole('columnheader', { name: 'Dose, mg' })).toBeNull();
    expect(screen.getAllByRole('cell')).toHaveLength(3);
  });

  it('exports what is shown, in the order shown', async () => {
    const user = userEvent.setup({ delay: null });
    let blob: Blob | undefined;
    vi.spyOn(HTMLAnchorElement.prototype, 'click').mockImplementation(() => {});
    vi.stubGlobal(
      'URL',
      Object.assign(URL, {
        createObjectURL: (made: Blob) => ((blob = made), 'blob:x'),
        revokeObjectURL: () => {},
      }),
    );
    render(table);
    await user.click(within(screen.getByRole('columnheader', { name: 'Code' })).getByRole('button'));
    await user.click(screen.getByRole('button', { name: 'Export CSV' }));
    expect(await textOf(blob)).toBe(
      'Code,"Dose, mg",State\r\nWELL-2,10.5,Halted\r\nWELL-3,,In review\r\nWELL-10,9,Open\r\n',
    );
  });

  it('says so without rows', () => {
    render(<DataTable caption="Trials" columns={columns} rows={[]} what="trials" />);
    expect(screen.getByText('No trials yet.')).toBeInTheDocument();
    expect(screen.queryByRole('table')).toBeNull();
  });
});

describe('a table that is only read', () => {
  it('names its rows, lines up its numbers without changing what is read, and dashes empty cells', () => {
    render(<StaticTable caption="Trials" columns={columns} rows={rows} stacked />);
    expect(screen.getByRole('table', { name: 'Trials' })).toBeInTheDocument();
    const row = screen.getByRole('row', { name: /WELL-10/ });
    expect(within(row).getAllByRole('cell')[0]?.textContent).toBe('9');
    expect(within(row).getAllByRole('cell')[0]?.querySelector('[data-padding]')).toHaveAttribute(
      'data-padding',
      '.0',
    );
    expect(within(screen.getByRole('row', { name: /WELL-3/ })).getAllByRole('cell')[0]).toHaveTextContent(
      '–',
    );
    expect(screen.getByRole('link', { name: 'WELL-2' })).toBeInTheDocument();
  });
});
