import { describe, expect, test } from 'vitest';
import { listRequests } from '#shared/contracts/requests.contract.ts';
import {
  cellsWords,
  listQuery,
  type ListFilters,
} from '#src/features/requests/list-filters.view.ts';

const unset: ListFilters = {
  state: 'all',
  kind: '',
  project: '',
  mine: '',
  text: '',
  neededBefore: '',
  sort: 'needed-by',
};

describe('the filters of the list', () => {
  test('that are not set are not sent', () => {
    expect(listQuery(unset)).toEqual({ sort: 'needed-by' });
  });

  test('go out as the endpoint takes them', () => {
    const query = listQuery({
      state: 'partly-booked',
      kind: 'screening',
      project: '4',
      mine: 'true',
      text: '  NP35 ',
      neededBefore: '2026-06-22',
      sort: 'oldest',
    });
    expect(listRequests.query.parse(query)).toEqual({
      sort: 'oldest',
      state: ['partly-booked'],
      kind: 'screening',
      projectId: 4,
      mine: 'true',
      text: 'NP35',
      neededBefore: '2026-06-22',
    });
  });

  test('ask at first for what is neither done nor withdrawn', () => {
    expect(listRequests.query.parse(listQuery({ ...unset, state: 'open' })).state).toEqual([
      'draft',
      'submitted',
      'partly-booked',
      'booked',
    ]);
  });

  test('that somebody wrote into the address by hand never break the list', () => {
    const query = listQuery({
      ...unset,
      project: 'abc',
      neededBefore: 'tomorrow',
      text: 'x'.repeat(200),
    });
    expect(query).toEqual({ sort: 'needed-by', text: 'x'.repeat(80) });
    expect(listRequests.query.safeParse(query).success).toBe(true);
  });
});

describe('the cells of a request in a word', () => {
  test('name one type with its number, several types after the sum, and nothing for a bare draft', () => {
    expect(cellsWords({ cellCount: 6, cellTypeNames: ['NP35'] })).toBe('6 × NP35');
    expect(cellsWords({ cellCount: 9, cellTypeNames: ['NP35', 'RC21'] })).toBe(
      '9 cells: NP35, RC21',
    );
    expect(cellsWords({ cellCount: 0, cellTypeNames: [] })).toBe('no cells yet');
  });
});
