import { describe, expect, it } from 'vitest';
import { decimalsFor, decimalsForStep, decimalsForUncertainty } from './digits';

describe('decimalsForUncertainty', () => {
  // Worked examples of the Review of Particle Physics, introduction, "Rounding" (from memory):
  // 0.827 ± 0.119 is written 0.83 ± 0.12; 0.827 ± 0.367 is written 0.8 ± 0.4.
  it.each([
    [0.119, 2],
    [0.367, 1],
    [0.354, 2],
    [0.355, 1],
    [0.96, 1],
    [4.2, 0],
    [0.05, 2],
  ])('writes ±%d to %d decimals', (expanded, decimals) => {
    expect(decimalsForUncertainty(expanded)).toBe(decimals);
  });
});

describe('decimalsFor', () => {
  it('falls back to the figure’s own rule without an uncertainty', () => {
    expect(decimalsFor(-108.83, null, { decimals: 1 })).toBe(1);
    expect(decimalsFor(0.00312, undefined, { significant: 2 })).toBe(4);
    expect(decimalsFor(1, 0, { decimals: 1 })).toBe(1);
  });

  it('never writes more decimals than a figure is ever worth', () => {
    expect(decimalsFor(-1.09, 0.0004, { decimals: 1, mostDecimals: 2 })).toBe(2);
    expect(decimalsFor(0.0007349, 8e-7, { significant: 2, mostSignificant: 3 })).toBe(6);
    expect(decimalsFor(0.021, 0.006, { significant: 2, mostSignificant: 3 })).toBe(3);
  });
});

describe('decimalsForStep', () => {
  it('tells neighbours apart and no more', () => {
    expect(decimalsForStep(0.7324)).toBe(1);
    expect(decimalsForStep(2)).toBe(0);
    expect(decimalsForStep(0)).toBe(0);
  });
});
