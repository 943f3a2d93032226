import { describe, expect, it } from 'vitest';
import { decimate, LINE_ABOVE_DB, lowerBound } from './decimate';

const BINS = 20_000;
const COLUMNS = 200;
const edges = Float64Array.from({ length: COLUMNS + 1 }, (_, index) => 10 ** (1 + (index * 3) / COLUMNS));

/** A noise of unit mean power and one line, from a small fixed generator. */
function noisySpectrum(): { x: Float64Array; y: Float64Array } {
  let state = 7;
  const next = () => (state = (state * 48271) % 2147483647) / 2147483647;
  const x = Float64Array.from({ length: BINS }, (_, index) => (index + 1) * 0.5);
  const y = x.map(
    () => -120 + 10 * Math.log10((-Math.log(next()) - Math.log(next()) - Math.log(next())) / 3),
  );
  y[8000] = -40;
  return { x, y };
}

/** The same rule, written the slow and plain way: filter every bin for every column. */
function bruteForceColumn(x: Float64Array, y: Float64Array, from: number, to: number) {
  const inside = [...x.keys()].filter((index) => x[index]! >= from && x[index]! < to);
  const power = inside.reduce((sum, index) => sum + 10 ** (y[index]! / 10), 0) / inside.length;
  return {
    count: inside.length,
    meanDb: 10 * Math.log10(power),
    maxDb: Math.max(...inside.map((index) => y[index]!)),
  };
}

describe('decimate', () => {
  it('draws the power mean of the bins under a pixel, and the maximum where a line stands', () => {
    const { x, y } = noisySpectrum();
    const drawn = decimate({ kind: 'spectrum', x, y }, edges);
    let compared = 0;
    for (let column = 0; column < COLUMNS; column += 1) {
      const from = edges[column]!;
      const to = edges[column + 1]!;
      const expected = bruteForceColumn(x, y, from, to);
      const at = [...drawn.x.keys()].find((index) => drawn.x[index]! >= from && drawn.x[index]! < to);
      if (expected.count < 2 || at === undefined) continue;
      const isLine = expected.maxDb > -120 + LINE_ABOVE_DB + 5;
      expect(drawn.y[at]).toBeCloseTo(isLine ? expected.maxDb : expected.meanDb, 9);
      compared += 1;
    }
    expect(compared).toBeGreaterThan(100);
  });

  it('puts a line at its own frequency with its own height', () => {
    const { x, y } = noisySpectrum();
    const drawn = decimate({ kind: 'spectrum', x, y }, edges);
    const top = drawn.y.indexOf(Math.max(...drawn.y));
    expect([drawn.x[top], drawn.y[top], drawn.count[top]]).toEqual([x[8000], -40, 1]);
  });

  it('draws every point where there are fewer points than pixels', () => {
    const x = Float64Array.of(1, 20, 30, 5000);
    const y = Float64Array.of(-1, -2, NaN, -4);
    const drawn = decimate({ kind: 'spectrum', x, y }, edges);
    expect([...drawn.x]).toEqual([1, 20, 30, 5000]);
    expect([...drawn.y]).toEqual([-1, -2, NaN, -4]);
  });

  it('loses no peak of a curve', () => {
    const x = Float64Array.from({ length: 10_000 }, (_, index) => 10 + index);
    const y = x.map((value) => Math.sin(value / 500));
    y[4321] = 9;
    y[7654] = -9;
    const drawn = decimate({ kind: 'curve', x, y }, edges);
    expect(Math.max(...drawn.y)).toBe(9);
    expect(Math.min(...drawn.y)).toBe(-9);
    expect(drawn.x.length).toBeLessThanOrEqual(4 * (COLUMNS + 2));
    expect([...drawn.x].every((value, index) => index === 0 || value > drawn.x[index - 1]!)).toBe(true);
  });

  it('keeps one point at each side of the view, so that lines run on to the frame', () => {
    const x = Float64Array.from({ length: 100 }, (_, index) => index * 1000);
    const drawn = decimate(
      { kind: 'curve', x, y: x },
      Float64Array.from({ length: 201 }, (_, index) => 5500 + index * 20),
    );
    expect([drawn.x[0], drawn.x.at(-1)]).toEqual([5000, 10000]);
  });
});

describe('lowerBound', () => {
  it('finds the first that is not below', () => {
    expect([0, 1, 1.5, 9].map((value) => lowerBound([1, 2, 3], value))).toEqual([0, 0, 1, 3]);
  });
});
