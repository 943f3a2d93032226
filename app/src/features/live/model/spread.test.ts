import { describe, expect, it } from 'vitest';
import type { BenchRecord } from '@benchlark/dsp';
import { spreadOf, spreadsOf } from './spread';

/** Twenty repeated readings of a temperature, JCGM 100:2008 (GUM), table 1 and 4.4.3, °C. */
const GUM_READINGS = [
  96.9, 98.18, 98.25, 98.61, 99.03, 99.49, 99.56, 99.74, 99.89, 100.07, 100.33, 100.42, 100.68, 100.95,
  101.11, 101.2, 101.57, 101.84, 102.36, 102.72,
];

describe('the spread of repeats', () => {
  it('is that of the worked example of the GUM, 4.4.3', () => {
    const { mean, deviation, standardUncertainty } = spreadOf(GUM_READINGS);
    expect(mean).toBeCloseTo(100.145, 3);
    expect(deviation).toBeCloseTo(1.489, 3);
    expect(standardUncertainty).toBeCloseTo(0.333, 3);
  });

  it('is told of figures that every repeat has', () => {
    const record = (figures: Record<string, number | null>) =>
      ({ channels: [{ channel: 'left', figures }] }) as unknown as BenchRecord;
    const spreads = spreadsOf([
      record({ fundamentalLevelDbfs: -1, thdDb: -60, noiseDbfs: null }),
      record({ fundamentalLevelDbfs: -1.2, thdDb: -62, noiseDbfs: -100 }),
    ]);
    expect(spreads.map(({ key }) => key).sort()).toEqual(['fundamentalLevelDbfs', 'thdDb']);
    expect(spreadsOf([record({ thdDb: -60 })])).toEqual([]);
  });
});
