import { decodeTrace, encodeTrace } from './stored-record';

describe('encodeTrace', () => {
  it('writes little-endian Float64, all x, then all y', () => {
    // IEEE 754: 1 is 3FF0 0000 0000 0000, -2 is C000 0000 0000 0000
    const bytes = encodeTrace({ x: [1], y: [-2] });
    expect(bytes.toString('hex')).toBe('000000000000f03f00000000000000c0');
  });

  it('is undone by decodeTrace to the last bit', () => {
    const x = Float64Array.from({ length: 100 }, (_, n) => n / 3);
    const y = x.map((value) => -value * 1e-300);
    expect(decodeTrace(encodeTrace({ x, y }))).toEqual({ x, y });
  });
});
