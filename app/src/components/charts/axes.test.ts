import { describe, expect, it } from 'vitest';
import type { AxisModel } from './chart-model';
import { makeScale } from './scales';
import { spreadLabels } from './spread-labels';
import { formatTick, makeTicks } from './ticks';

const frequency: AxisModel = { quantity: 'Frequency', unit: 'Hz', scale: 'log', min: 20, max: 20000 };
const level: AxisModel = { quantity: 'Level', unit: 'dBFS', scale: 'linear', min: -160, max: 0 };
const phase: AxisModel = {
  quantity: 'Phase',
  unit: 'degrees',
  scale: 'linear',
  min: 0,
  max: 360,
  tickStep: 45,
};

describe('makeScale', () => {
  it.each(['linear', 'log'] as const)('goes to pixels and back on a %s axis', (kind) => {
    const scale = makeScale(kind, 20, 20000, 50, 650);
    expect(scale.toPx(20)).toBeCloseTo(50, 9);
    expect(scale.toPx(20000)).toBeCloseTo(650, 9);
    expect(scale.fromPx(scale.toPx(997))).toBeCloseTo(997, 6);
  });

  it('gives each decade of a log axis the same length', () => {
    const { toPx } = makeScale('log', 20, 20000, 0, 600);
    expect(toPx(200) - toPx(20)).toBeCloseTo(toPx(20000) - toPx(2000), 9);
  });
});

describe('makeTicks', () => {
  it('labels a wide log axis at 1 2 5', () => {
    const { major, minor } = makeTicks(frequency, 20, 20000, 600, 34);
    expect(major).toEqual([20, 50, 100, 200, 500, 1000, 2000, 5000, 10000, 20000]);
    expect(minor).toContain(700);
  });

  it('labels a narrow one at its start and at each decade', () => {
    expect(makeTicks(frequency, 20, 20000, 260, 34).major).toEqual([20, 100, 1000, 10000]);
  });

  it('falls back to even steps close in, so that no axis is bare', () => {
    expect(makeTicks(frequency, 980, 1020, 600, 34).major).toEqual([
      980, 985, 990, 995, 1000, 1005, 1010, 1015, 1020,
    ]);
  });

  it('gives a linear axis five to ten majors with minors between', () => {
    const { major, minor } = makeTicks(level, -160, 0, 306, 30);
    expect(major).toEqual([-160, -140, -120, -100, -80, -60, -40, -20, 0]);
    expect(minor).toContain(-10);
  });

  it('keeps to 45 degrees, or 90 where there is no room', () => {
    expect(makeTicks(phase, 0, 360, 600, 34).major).toEqual([0, 45, 90, 135, 180, 225, 270, 315, 360]);
    expect(makeTicks(phase, 0, 360, 250, 34).major).toEqual([0, 90, 180, 270, 360]);
  });

  it('writes thousands of hertz by a k and signs where asked', () => {
    expect([500, 1000, 2500, 20000].map((value) => formatTick(frequency, value))).toEqual([
      '500',
      '1k',
      '2.5k',
      '20k',
    ]);
    expect([-2, 0, 2].map((value) => formatTick({ ...level, isSigned: true }, value))).toEqual([
      '\u22122',
      '0',
      '+2',
    ]);
  });
});

describe('spreadLabels', () => {
  const height = 17;
  it('leaves labels alone that do not touch', () => {
    expect(
      spreadLabels(
        [
          { wanted: 50, height },
          { wanted: 100, height },
        ],
        0,
        300,
      ),
    ).toEqual([50, 100]);
  });

  it('pushes neighbours apart equally and keeps their order', () => {
    expect(
      spreadLabels(
        [
          { wanted: 102, height },
          { wanted: 100, height },
        ],
        0,
        300,
      ),
    ).toEqual([109.5, 92.5]);
  });

  it('holds a crowd within the frame, none overlapping', () => {
    const wishes = Array.from({ length: 6 }, () => ({ wanted: 298, height }));
    const middles = spreadLabels(wishes, 0, 300);
    expect(Math.max(...middles)).toBeLessThanOrEqual(300 - height / 2);
    middles.slice(1).forEach((middle, index) => expect(middle - middles[index]!).toBeCloseTo(height, 9));
  });

  it('gives two lines the room they need', () => {
    const [first, second] = spreadLabels(
      [
        { wanted: 100, height: 31 },
        { wanted: 101, height },
      ],
      0,
      300,
    );
    expect(second! - first!).toBeCloseTo(24, 9);
  });
});
