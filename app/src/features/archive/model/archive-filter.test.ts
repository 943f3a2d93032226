import { describe, expect, it } from 'vitest';
import {
  isNarrowed,
  NO_FILTER,
  readChosen,
  readFilter,
  toQuery,
  writeChosen,
  writeFilter,
} from './archive-filter';
import type { ArchiveFilter } from './archive-filter';

const everything: ArchiveFilter = {
  unitId: 'u1',
  isUnsorted: false,
  conditionId: 'c1',
  rigId: 'r1',
  measure: 'tone',
  state: 'failed',
  warnings: 'without',
  since: '2026-11-01',
  until: '2026-11-30',
  words: 'hum, left',
  sort: 'fileName',
  order: 'asc',
};

describe('the archive filter in the address', () => {
  it('comes back from the address as it was written', () => {
    expect(readFilter(writeFilter(everything, new URLSearchParams()))).toEqual(everything);
    const unsorted = { ...NO_FILTER, isUnsorted: true };
    expect(readFilter(writeFilter(unsorted, new URLSearchParams()))).toEqual(unsorted);
  });

  it('leaves the plain archive without any parameters and keeps those of others', () => {
    expect(writeFilter(NO_FILTER, new URLSearchParams()).toString()).toBe('');
    expect(writeFilter(NO_FILTER, new URLSearchParams('chosen=3&q=x')).toString()).toBe('chosen=3');
  });

  it('takes what it does not understand for not asked', () => {
    const params = new URLSearchParams(
      'state=lost&warnings=maybe&since=yesterday&until=2026-13-45&sort=colour&order=up',
    );
    expect(readFilter(params)).toEqual(NO_FILTER);
  });

  it('says whether the view is narrowed; order alone does not narrow it', () => {
    expect(isNarrowed({ ...NO_FILTER, sort: 'fileName', order: 'asc' })).toBe(false);
    expect(isNarrowed({ ...NO_FILTER, words: 'hum' })).toBe(true);
  });
});

describe('the question to the server', () => {
  it('turns days into the midnights around them, in local time', () => {
    const query = toQuery(everything);
    expect(query.since).toBe(new Date(2026, 10, 1).toISOString());
    expect(query.until).toBe(new Date(2026, 11, 1).toISOString());
  });

  it('asks for no unit instead of a unit', () => {
    expect(toQuery({ ...everything, isUnsorted: true })).toMatchObject({ unsorted: true });
    expect(toQuery({ ...everything, isUnsorted: true })).not.toHaveProperty('unitId');
  });

  it('asks only for what was narrowed', () => {
    expect(toQuery(NO_FILTER)).toEqual({ sort: 'uploadedAt', order: 'desc' });
  });
});

describe('the chosen rows in the address', () => {
  it('come back sorted and without nonsense', () => {
    const params = writeChosen(new Set([2058, 2033]), new URLSearchParams());
    expect(params.get('chosen')).toBe('2033,2058');
    expect([...readChosen(params)]).toEqual([2033, 2058]);
    expect(readChosen(new URLSearchParams('chosen=a,-1,2.5')).size).toBe(0);
    expect(writeChosen(new Set(), params).has('chosen')).toBe(false);
  });
});
