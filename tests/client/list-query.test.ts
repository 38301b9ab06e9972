import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { revisionStates, tableSorts } from '../../shared/contract/index.ts';
import {
  changedQuery,
  isFiltered,
  readListQuery,
  sortedBy,
  unfiltered,
  viewOf,
} from '../../src/features/tables/list-query.ts';

const read = (address: string) => readListQuery(new URLSearchParams(address));

describe('the address of the tables list', () => {
  test('asks for what it says, and by default for the newest of the library', () => {
    expect(read('')).toEqual({});
    expect(viewOf({})).toEqual({
      search: '',
      tag: undefined,
      state: undefined,
      isArchived: false,
      sort: 'changed',
      direction: 'desc',
      cursor: undefined,
    });
    expect(
      viewOf(read('search=fo+sig&tag=fog&state=vetted&archived=yes&sort=snr&direction=asc&cursor=abc')),
    ).toEqual({
      search: 'fo sig',
      tag: 'fog',
      state: 'vetted',
      isArchived: true,
      sort: 'snr',
      direction: 'asc',
      cursor: 'abc',
    });
  });

  test.each([
    'sort=colour',
    'direction=up',
    'state=lost',
    'archived=maybe',
    'tag=%2F%2F',
    'limit=7',
    'x=1',
    'search=',
  ])('leaves %s out', (address) => expect(read(address)).toEqual({}));

  test('reads back what it writes', () => {
    const queries = fc.record(
      {
        search: fc.stringMatching(/^[a-z]{1,9}( [a-z]{1,9})?$/),
        tag: fc.stringMatching(/^[a-z][a-z0-9-]{0,9}$/),
        state: fc.constantFrom(...revisionStates),
        archived: fc.constant('yes'),
        sort: fc.constantFrom(...tableSorts),
        direction: fc.constantFrom('asc', 'desc'),
      },
      { requiredKeys: [] },
    );
    fc.assert(
      fc.property(queries, (query) => {
        const written = changedQuery({}, query);
        expect(read(String(new URLSearchParams(written)))).toEqual(written);
      }),
      { seed: 3 },
    );
  });

  test('begins at the first page again with every other filter or order', () => {
    const query = { search: 'fog', cursor: 'abc' };
    expect(changedQuery(query, { tag: 'lamp' })).toEqual({ search: 'fog', tag: 'lamp' });
    expect(sortedBy(query, 'title')).toEqual({ search: 'fog', sort: 'title', direction: 'asc' });
    expect(unfiltered({ ...query, sort: 'title' })).toEqual({ sort: 'title' });
  });

  test('sorts by a column, then the other way round', () => {
    const once = sortedBy({}, 'snr');
    expect(viewOf(once)).toMatchObject({ sort: 'snr', direction: 'desc' });
    const twice = sortedBy(once, 'snr');
    expect(viewOf(twice)).toMatchObject({ sort: 'snr', direction: 'asc' });
    expect(sortedBy(twice, 'snr')).toEqual(once);
  });

  test('knows a filter from an order', () => {
    expect(isFiltered(read('sort=title&direction=asc&cursor=abc'))).toBe(false);
    for (const one of ['search=a', 'tag=a', 'state=draft', 'archived=yes'])
      expect(isFiltered(read(one))).toBe(true);
  });
});
