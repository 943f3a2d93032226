import { describe, expect, it } from 'vitest';
import { residualScale } from './residual-scale';

describe('the scale of a residual', () => {
  it('is percent where clipping shows, millionths where only the converter does', () => {
    expect(residualScale('FS', [Float64Array.of(0, -0.037)]).unit).toBe('% of full scale');
    expect(residualScale('FS', [Float64Array.of(2e-6), Float64Array.of(-1e-5)])).toEqual({
      factor: 1e6,
      unit: 'ppm of full scale',
    });
  });

  it('follows the largest channel, and leaves another unit as it is', () => {
    expect(residualScale('FS', [Float64Array.of(1e-6), Float64Array.of(1e-3)]).unit).toBe('% of full scale');
    expect(residualScale('V', [Float64Array.of(1e-6)])).toEqual({ factor: 1, unit: 'V' });
  });
});
