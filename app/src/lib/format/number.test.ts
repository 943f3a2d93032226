import { describe, expect, it } from 'vitest';
import { decimalsForSignificant, formatNumber } from './number';

describe('formatNumber', () => {
  it.each([
    [-108.84, 1, '\u2212108.8'],
    [0.05, 1, '0.1'],
    [1.005, 2, '1.01'],
    [-0.04, 1, '0.0'],
    [65536, 0, '65\u202f536'],
    [1234567.891, 2, '1\u202f234\u202f567.89'],
    [1994, -2, '2\u202f000'],
    [1e-7, 9, '0.000000100'],
  ])('prints %d at %d decimals as %s', (value, decimals, text) => {
    expect(formatNumber(value, { decimals })).toBe(text);
  });

  it('prints a plus only where asked and never before zero', () => {
    expect(formatNumber(3.7, { decimals: 1, isSigned: true })).toBe('+3.7');
    expect(formatNumber(0.01, { decimals: 1, isSigned: true })).toBe('0.0');
  });
});

describe('decimalsForSignificant', () => {
  it.each([
    [0.00312, 2, 4],
    [0.0996, 2, 2],
    [12.3, 2, 0],
    [1234, 2, -2],
    [0, 2, 1],
  ])('%d to %d digits needs %d decimals', (value, digits, decimals) => {
    expect(decimalsForSignificant(value, digits)).toBe(decimals);
  });
});
