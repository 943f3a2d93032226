import { expect, it } from 'vitest';
import table from '../../../test-vectors/weighting/a-c-z.json' with { type: 'json' };
import bs468 from '../../../test-vectors/weighting/bs468.json' with { type: 'json' };
import { meanSquareToDbfs } from '../level/decibel.js';
import { createSpectrumAverager } from '../spectrum/create-spectrum-averager.js';
import { sumBand } from '../spectrum/integrate-band.js';
import { sine } from '../testing/signals.js';
import { createWeightingFactors, weightingDb, weightingPower } from './weighting-curves.js';

// IEC 61672-1:2013, Annex E, computed: test-vectors/weighting.
it('follows the analytic A and C curves', () => {
  for (const row of table.rows) {
    expect(weightingDb('a', row.exactHz)).toBeCloseTo(row.aExact, 9);
    expect(weightingDb('c', row.exactHz)).toBeCloseTo(row.cExact, 9);
    // Class 1 limits hold a fortiori; null is minus infinity.
    expect(weightingDb('a', row.exactHz) - row.A).toBeGreaterThan(row.class1LowerDb ?? -Infinity);
  }
});

// ITU-R BS.468-4, Table 1, and its network's response.
it('follows BS.468 and, 5.63 dB lower, CCIR-RMS', () => {
  for (const row of bs468.rows) {
    expect(weightingDb('itu-468', row.hz)).toBeCloseTo(row.formulaDb, 9);
    expect(weightingDb('itu-468-rms', row.hz)).toBeCloseTo(row.ccirRmsDb, 9);
  }
  expect(weightingDb('itu-468', bs468.peakHz)).toBeCloseTo(bs468.peakDb, 6);
});

it('weights nothing at 0 Hz and everything with none', () => {
  for (const name of ['a', 'c', 'itu-468', 'itu-468-rms'] as const) expect(weightingPower(name, 0)).toBe(0);
  expect(Array.from(createWeightingFactors('none', 3, 100))).toEqual([1, 1, 1]);
});

// AES17-2015, 5.2.7: unity at 2 kHz, so -5.63 dB at 1 kHz.
it.each([
  [1000, -25.63],
  [2000, -20],
])('reads a -20 dBFS tone of %i Hz through CCIR-RMS', (frequencyHz, expectedDbfs) => {
  const averager = createSpectrumAverager({
    sampleRateHz: 48_000,
    fftLength: 16_384,
    windowName: 'blackman-harris-7',
    overlap: 0.75,
  });
  averager.push(sine(48_000, 48_000, frequencyHz, 0.1));
  const spectrum = averager.finish();
  const weights = createWeightingFactors('itu-468-rms', 8193, spectrum.binWidthHz);
  // The curve bends over the lobe's width by a few thousandths of a decibel.
  expect(Math.abs(meanSquareToDbfs(sumBand(spectrum, 20, 20_000, { weights })) - expectedDbfs)).toBeLessThan(
    0.01,
  );
});
