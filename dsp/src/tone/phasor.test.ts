import { expect, it } from 'vitest';
import { writePhasor } from './phasor.js';

it('stays on the circle over a long run', () => {
  const cos = new Float64Array(100_000);
  const sin = new Float64Array(100_000);
  writePhasor(0.123456789, -1.5, cos, sin);
  for (let n = 0; n < cos.length; n += 997) {
    // The phase grows to 12,346 rad, where a double's step is 1.8e-12: two ways of rounding it may differ by that.
    expect(Math.abs(cos[n] - Math.cos(-1.5 + 0.123456789 * n))).toBeLessThan(2e-12);
    expect(Math.abs(sin[n] - Math.sin(-1.5 + 0.123456789 * n))).toBeLessThan(2e-12);
  }
});
