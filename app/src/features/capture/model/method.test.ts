import { describe, expect, it } from 'vitest';
import { checkMethod, isSameMethod, toRequest } from './method';
import type { Method } from './method';

const capture = { durationS: 5.00002, sampleRateHz: 96_000 };
const method: Method = {
  measure: 'tone',
  fromS: 0,
  toS: 5,
  bandLowHz: 20,
  bandHighHz: 20_000,
  highestHarmonic: 10,
};

describe('asking for another analysis', () => {
  it('leaves out what the program takes by itself', () => {
    expect(toRequest(method, capture)).toEqual({ measure: 'tone' });
  });

  it('sends each setting that differs', () => {
    expect(
      toRequest({ ...method, fromS: 1, toS: 4, bandHighHz: 40_000, highestHarmonic: 20 }, capture),
    ).toEqual({
      measure: 'tone',
      fromS: 1,
      toS: 4,
      bandHighHz: 40_000,
      highestHarmonic: 20,
    });
  });

  it('knows whether anything was changed', () => {
    expect(isSameMethod(method, { ...method })).toBe(true);
    expect(isSameMethod(method, { ...method, measure: 'idle' })).toBe(false);
  });
});

describe('a method that cannot be measured', () => {
  it('is allowed when it fits the recording', () => {
    expect(checkMethod(method, capture)).toEqual({});
    expect(checkMethod({ ...method, bandHighHz: 48_000 }, capture)).toEqual({});
  });

  it.each<[Partial<Method>, keyof Method]>([
    [{ fromS: -1 }, 'fromS'],
    [{ fromS: 5, toS: 5 }, 'toS'],
    [{ toS: 6 }, 'toS'],
    [{ bandLowHz: 0 }, 'bandLowHz'],
    [{ bandHighHz: 20 }, 'bandHighHz'],
    [{ bandHighHz: 48_001 }, 'bandHighHz'],
    [{ highestHarmonic: 1 }, 'highestHarmonic'],
    [{ highestHarmonic: 2.5 }, 'highestHarmonic'],
    [{ fromS: Number.NaN }, 'fromS'],
  ])('%j is refused at its own word', (change, key) => {
    expect(Object.keys(checkMethod({ ...method, ...change }, capture))).toContain(key);
  });
});
