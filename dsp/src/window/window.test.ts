import { expect, it } from 'vitest';
import vectors from '../../../test-vectors/windows/windows.json' with { type: 'json' };
import { createWindow } from './create-window.js';
import { WINDOW_NAMES } from './window-coefficients.js';
import { highestSideLobeDb, scallopingLossDb, windowResponse } from './window-response.js';

it.each(WINDOW_NAMES)('%s has the figures of its published coefficients', (name) => {
  const expected = vectors.windows[name];
  const window = createWindow(name, 4096);
  // The table holds the limit of a long window; the periodic form has those values at every length above its terms.
  expect(window.coherentGain).toBeCloseTo(expected.coherentGain, 12);
  expect(window.powerGain).toBeCloseTo(expected.powerGain, 12);
  expect(window.enbwBins).toBeCloseTo(expected.enbwBins, 10);
  expect(window.exclusionHalfWidthBins).toBe(expected.excludeHalfWidthBins);
  // Four decimals: coefficients of 14 digits leave the deepest side lobes uncertain in the fifth.
  expect(scallopingLossDb(name)).toBeCloseTo(expected.scallopLossDb, 8);
  expect(Math.abs(highestSideLobeDb(name) - expected.highestSideLobeDb)).toBeLessThan(0.005);
});

it('is symmetric about the middle in its periodic form', () => {
  const { samples } = createWindow('blackman-harris-7', 64);
  // Cosines of mirrored angles differ in the last bits alone.
  for (let n = 1; n < 32; n++) expect(samples[n]).toBeCloseTo(samples[64 - n], 14);
  expect(samples[32]).toBeCloseTo(1, 12);
});

it('has its first null at the exclusion half-width', () => {
  // Values this small are rounding: the transform is exactly 0 there.
  for (const name of WINDOW_NAMES) {
    const { exclusionHalfWidthBins } = createWindow(name, 16);
    expect(Math.abs(windowResponse(name, exclusionHalfWidthBins))).toBeLessThan(1e-14);
    expect(windowResponse(name, 0)).toBeCloseTo(1, 14);
  }
});

it.each([0, -1, 1.5, Number.NaN])('refuses a length of %s', (length) => {
  expect(() => createWindow('hann', length)).toThrow(expect.objectContaining({ code: 'BAD_ARGUMENT' }));
});

it('makes a window of one sample', () => {
  expect(Array.from(createWindow('rectangular', 1).samples)).toEqual([1]);
});
