// @vitest-environment happy-dom
import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { MemoryRouter, useLocation } from 'react-router-dom';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { Button } from '#src/components/ui/button.tsx';
import { Choice } from '#src/components/ui/choice.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { refuseFile } from '#src/components/ui/file-input.tsx';
import { NumberInput } from '#src/components/ui/input.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Table, type Sort } from '#src/components/ui/table.tsx';
import { useUrlChoice } from '#src/hooks/use-url-state.ts';

afterEach(cleanup);

describe('a button', () => {
  test('that cannot be pressed stays in reach, says why and does nothing', async () => {
    const press = vi.fn();
    render(
      <Button why="1 point missing" onClick={press}>
        Send for approval
      </Button>,
    );
    const button = screen.getByRole('button', { name: 'Send for approval: 1 point missing' });
    await userEvent.tab();
    expect(document.activeElement).toBe(button);
    await userEvent.keyboard('{Enter}');
    expect(press).not.toHaveBeenCalled();
    expect(button.getAttribute('aria-disabled')).toBe('true');
  });

  test('that is busy ignores a second press', async () => {
    const press = vi.fn();
    render(
      <Button busy onClick={press}>
        Ask for this
      </Button>,
    );
    await userEvent.click(screen.getByRole('button', { name: 'Ask for this' }));
    expect(press).not.toHaveBeenCalled();
  });
});

describe('a field', () => {
  test('names its control and reads out the error before the help', () => {
    render(
      <Field
        label="Set temperature"
        help="Cell limit in storage 60 °C."
        error="Above the cell limit of 60 °C."
      >
        <NumberInput defaultValue="75" unit="°C" />
      </Field>,
    );
    const input = screen.getByRole('textbox', { name: 'Set temperature' });
    const described = (input.getAttribute('aria-describedby') ?? '').split(' ');
    expect(described.map((id) => document.getElementById(id)?.textContent)).toEqual([
      'Above the cell limit of 60 °C.',
      'Cell limit in storage 60 °C.',
    ]);
    expect(input.getAttribute('aria-invalid')).toBe('true');
  });

  test('keeps what was typed, with its comma', async () => {
    render(
      <Field label="Cells">
        <NumberInput />
      </Field>,
    );
    const input = screen.getByLabelText('Cells');
    await userEvent.type(input, '12,5');
    expect(input).toHaveProperty('value', '12,5');
  });

  test('names a set of joined words as a group', async () => {
    const change = vi.fn();
    render(
      <Field label="Result" as="group">
        <Choice
          options={[
            { value: 'screening', label: 'Screening' },
            { value: 'settled', label: 'Settled value' },
          ]}
          value="settled"
          onChange={change}
        />
      </Field>,
    );
    const group = screen.getByRole('radiogroup', { name: 'Result' });
    expect(within(group).getByRole('radio', { name: 'Settled value' })).toHaveProperty(
      'checked',
      true,
    );
    await userEvent.click(within(group).getByRole('radio', { name: 'Screening' }));
    expect(change).toHaveBeenCalledWith('screening');
  });
});

test('a state is a mark for the eye and a word for everybody', () => {
  render(
    <State mark="pass" tone="reed">
      pass
    </State>,
  );
  expect(screen.getByText('pass')).toBeTruthy();
  expect(document.querySelector('svg')?.getAttribute('aria-hidden')).toBe('true');
});

type Row = { id: number; name: string };
const columns = [
  { key: 'id', head: 'Record', cell: (row: Row) => row.id, mono: true, sortable: true },
  { key: 'name', head: 'Name', cell: (row: Row) => row.name },
];
const rows: Row[] = [
  { id: 2418, name: 'first' },
  { id: 2425, name: 'second' },
];

function SortedTable() {
  const [sort, setSort] = useState<Sort>({ key: 'id', direction: 'ascending' });
  return (
    <Table
      caption="Bookings"
      columns={columns}
      rows={rows}
      rowKey={(row) => row.id}
      sort={sort}
      onSort={setSort}
    />
  );
}

describe('a table', () => {
  test('says which column orders it and turns round on a press', async () => {
    render(<SortedTable />);
    const head = screen.getByRole('columnheader', { name: 'Record' });
    expect(head.getAttribute('aria-sort')).toBe('ascending');
    await userEvent.click(within(head).getByRole('button'));
    expect(head.getAttribute('aria-sort')).toBe('descending');
    expect(screen.getByRole('columnheader', { name: 'Name' }).hasAttribute('aria-sort')).toBe(
      false,
    );
  });

  test('without rows says what is not there', () => {
    render(
      <Table
        caption="Bookings"
        columns={columns}
        rows={[]}
        rowKey={(row) => row.id}
        empty="No booking in these weeks."
      />,
    );
    expect(screen.getByText('No booking in these weeks.')).toBeTruthy();
    expect(screen.queryByRole('table')).toBeNull();
  });

  test('that failed names the matter, the request and the way on', async () => {
    const retry = vi.fn();
    render(
      <Table
        caption="Bookings"
        columns={columns}
        rows={[]}
        rowKey={(row) => row.id}
        error={{ detail: 'The server did not answer.', requestId: '9f6d', onRetry: retry }}
      />,
    );
    expect(screen.getByRole('alert').textContent).toContain('The server did not answer.');
    expect(screen.getByRole('alert').textContent).toContain('9f6d');
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }));
    expect(retry).toHaveBeenCalledOnce();
  });

  test('shows how many there are and fetches more', async () => {
    const more = vi.fn();
    render(
      <Table
        caption="Bookings"
        columns={columns}
        rows={rows}
        rowKey={(row) => row.id}
        more={{ onMore: more, total: 12 }}
      />,
    );
    expect(screen.getByText('2 of 12 shown')).toBeTruthy();
    await userEvent.click(screen.getByRole('button', { name: 'Show more' }));
    expect(more).toHaveBeenCalledOnce();
  });
});

describe('a file', () => {
  const rules = { types: ['.csv'], maxBytes: 1_000_000 };

  test('of the right kind and size is taken', () => {
    expect(refuseFile({ name: 'Log.CSV', size: 10 }, rules)).toBeUndefined();
  });

  test('against the rules is refused by name', () => {
    expect(refuseFile({ name: 'log.exe', size: 10 }, rules)).toContain('log.exe');
    expect(refuseFile({ name: 'log.csv', size: 2_000_000 }, rules)).toContain(
      'log.csv is 2.0\u202fMB',
    );
  });
});

function Filter() {
  const [state, setState] = useUrlChoice('state', ['open', 'done'], 'open');
  return (
    <>
      <Button
        onClick={() => {
          setState(state === 'open' ? 'done' : 'open');
        }}
      >
        {state}
      </Button>
      <output>{useLocation().search}</output>
    </>
  );
}

describe('a filter', () => {
  test('lives in the URL and leaves it at its fallback', async () => {
    render(
      <MemoryRouter initialEntries={['/requests?page=2']}>
        <Filter />
      </MemoryRouter>,
    );
    await userEvent.click(screen.getByRole('button', { name: 'open' }));
    expect(screen.getByRole('status').textContent).toBe('?page=2&state=done');
    await userEvent.click(screen.getByRole('button', { name: 'done' }));
    expect(screen.getByRole('status').textContent).toBe('?page=2');
  });

  test('takes a foreign value in the URL for its fallback', () => {
    render(
      <MemoryRouter initialEntries={['/requests?state=purple']}>
        <Filter />
      </MemoryRouter>,
    );
    expect(screen.getByRole('button', { name: 'open' })).toBeTruthy();
  });
});
