import { describe, expect, it } from 'vitest';
import { daysOf, spanTo } from './chosen-rows';

describe('rows by day', () => {
  it('gives each day the number of its rows at the first of them', () => {
    const at = (day: number, hour: number) => ({ uploadedAt: new Date(2026, 10, day, hour).toISOString() });
    expect(daysOf([at(19, 10), at(19, 9), at(12, 15), at(9, 17)])).toEqual([2, 0, 1, 1]);
    expect(daysOf([])).toEqual([]);
  });
});

describe('choosing a run of rows', () => {
  const numbers = [2058, 2057, 2056, 2036];
  it('takes all from the last touched row to this one, upwards too', () => {
    expect(spanTo(numbers, 2058, 2056)).toEqual([2058, 2057, 2056]);
    expect(spanTo(numbers, 2036, 2057)).toEqual([2057, 2056, 2036]);
  });
  it('takes this one alone when there was none before or it is no longer shown', () => {
    expect(spanTo(numbers, null, 2057)).toEqual([2057]);
    expect(spanTo(numbers, 1999, 2057)).toEqual([2057]);
  });
});
