import { describe, expect, it } from 'vitest';
import published from '../../../../test-vectors/loudness/loudness.json' with { type: 'json' };
import type { BenchRecord } from '../../record/record.js';
import { quantise } from '../../testing/signals.js';
import { analyseSamples, warningCodes } from '../testing/analyse-samples.js';
import { createKFilter, designKWeighting, gainDbOf } from './k-weighting.js';
import { loudnessMeasure } from './loudness-measure.js';

const RATE_HZ = 48_000;

/** A sine of 1 kHz in stretches of level (peak, dBFS; -Infinity for silence) and seconds. */
function stretches(parts: readonly (readonly [number, number])[], rate = RATE_HZ): Float64Array {
  const total = parts.reduce((sum, [, seconds]) => sum + Math.round(seconds * rate), 0);
  const samples = new Float64Array(total);
  let at = 0;
  for (const [level, seconds] of parts) {
    const amplitude = 10 ** (level / 20);
    const end = at + Math.round(seconds * rate);
    for (; at < end; at++) samples[at] = amplitude * Math.sin((2 * Math.PI * 1000 * at) / rate);
  }
  return samples;
}

const measure = (channels: readonly Float64Array[], rate = RATE_HZ, options = {}): Promise<BenchRecord> =>
  analyseSamples(loudnessMeasure, channels, rate, options);

function between({ between: { figures } }: BenchRecord, key: string): number {
  const value = figures[key];
  if (typeof value !== 'number') throw new Error(`${key} is ${String(value)}`);
  return value;
}

const stereo = (samples: Float64Array): Float64Array[] => [samples, samples];

describe('the K weighting', () => {
  it('has the published coefficients at 48 kHz', () => {
    const [shelf, highPass] = designKWeighting(48_000);
    // ITU-R BS.1770-5, Annex 1, Tables 1 and 2.
    published.stage1_48k.b.forEach((value, k) => expect(shelf.b[k]).toBeCloseTo(value, 11));
    published.stage1_48k.a.forEach((value, k) => expect(shelf.a[k]).toBeCloseTo(value, 11));
    published.stage2_48k.a.forEach((value, k) => expect(highPass.a[k]).toBeCloseTo(value, 11));
  });

  it.each(published.kGain)('has the published gain at $hz Hz', ({ hz, db48k }) => {
    expect(gainDbOf(designKWeighting(48_000), hz, 48_000)).toBeCloseTo(db48k, 6);
  });

  it.each([44_100, 48_000, 88_200, 96_000, 176_400, 192_000])(
    'reads 997 Hz at full scale as -3.01 LUFS at %d Hz',
    (rate) => {
      const filter = createKFilter(rate);
      const samples = Float64Array.from({ length: 2 * rate }, (_, n) =>
        Math.sin((2 * Math.PI * 997 * n) / rate),
      );
      filter.sumOfSquares(samples, 0, rate);
      const power = filter.sumOfSquares(samples, rate, 2 * rate) / rate;
      // ITU-R BS.1770-5: one front channel, 0 dBFS, 997 Hz.
      expect(-0.691 + 10 * Math.log10(power)).toBeCloseTo(-3.01, 2);
    },
  );
});

describe('programme loudness', () => {
  // EBU Tech 3341 (2023), Table 1: cases 1 to 5, ±0.1 LU.
  it.each([
    { number: 1, parts: [[-23, 20]], expected: -23 },
    { number: 2, parts: [[-33, 20]], expected: -33 },
    {
      number: 3,
      parts: [
        [-36, 10],
        [-23, 60],
        [-36, 10],
      ],
      expected: -23,
    },
    {
      number: 4,
      parts: [
        [-72, 10],
        [-36, 10],
        [-23, 60],
        [-36, 10],
        [-72, 10],
      ],
      expected: -23,
    },
    {
      number: 5,
      parts: [
        [-26, 20],
        [-20, 20.1],
        [-26, 20],
      ],
      expected: -23,
    },
  ] as const)('case $number', async ({ parts, expected }) => {
    const record = await measure(stereo(stretches(parts)));
    expect(Math.abs(between(record, 'integratedLufs') - expected)).toBeLessThan(0.1);
  });

  it('case 6: five channels, surrounds weighted', async () => {
    const channels = [-28, -28, -24, -30, -30].map((level) => stretches([[level, 20]]));
    expect(Math.abs(between(await measure(channels), 'integratedLufs') + 23)).toBeLessThan(0.1);
  });

  it.each([44_100, 96_000, 192_000])('case 1 at %d Hz', async (rate) => {
    const record = await measure(stereo(stretches([[-23, 6]], rate)), rate);
    expect(Math.abs(between(record, 'integratedLufs') + 23)).toBeLessThan(0.1);
  });

  it('case 9: short-term loudness stays at -23 through bursts', async () => {
    const burst = [
      [-20, 1.34],
      [-30, 1.66],
    ] as const;
    const record = await measure(stereo(stretches([...burst, ...burst, ...burst, ...burst, ...burst])));
    const { x, y } = record.between.traces['shortTerm'];
    expect(x[0]).toBeCloseTo(3, 9);
    for (const value of Array.from(y)) expect(Math.abs(value + 23)).toBeLessThan(0.1);
  });

  it('case 10: a burst of three seconds reads -23 at its highest wherever it begins', async () => {
    for (const delay of [0, 0.15, 0.45, 1.05, 2.85]) {
      const record = await measure(
        stereo(
          stretches([
            [-Infinity, delay],
            [-23, 3],
            [-Infinity, 1],
          ]),
        ),
      );
      expect(Math.abs(Math.max(...Array.from(record.between.traces['shortTerm'].y)) + 23)).toBeLessThan(0.1);
    }
  });
});

describe('loudness range', () => {
  // EBU Tech 3342: ±1 LU.
  it.each(published.loudnessRangeCases)(
    'case $case is $expectedLRA LU',
    async ({ definition, expectedLRA }) => {
      const record = await measure(stereo(stretches(definition as [number, number][])));
      expect(Math.abs(between(record, 'loudnessRangeLu') - expectedLRA)).toBeLessThan(1);
    },
  );
});

describe('peaks', () => {
  it('are told with those between the samples, against the loudness', async () => {
    // EBU Tech 3341 (2023), case 15's signal: fs/4 at 45° and half of full scale, -6.0 dBTP (+0.2/-0.4).
    const samples = Float64Array.from(
      { length: 5 * RATE_HZ },
      (_, n) => 0.5 * Math.sin((Math.PI / 2) * n + Math.PI / 4),
    );
    const record = await measure(stereo(samples));
    expect(between(record, 'samplePeakDbfs')).toBeCloseTo(-9.0309, 3);
    expect(Math.abs(between(record, 'truePeakDbtp') + 6.02 - -0.1)).toBeLessThan(0.3);
    expect(between(record, 'peakToLoudnessRatioDb')).toBeCloseTo(
      between(record, 'truePeakDbtp') - between(record, 'integratedLufs'),
      9,
    );
  });

  it('that were cut off are counted', async () => {
    const clipped = quantise(
      stretches([[3, 4]]).map((x) => Math.max(-1, Math.min(1, x))),
      16,
    );
    const record = await measure(stereo(clipped), RATE_HZ, { bits: 16 });
    // Two tops a period, both channels, 4 s of 1 kHz.
    expect(between(record, 'clippedRunCount')).toBe(2 * 2 * 4000);
    expect(warningCodes(record)).toContain('programme-clipped');
  });
});

describe('what can’t be told', () => {
  it('of silence: no loudness, and a reason', async () => {
    const record = await measure(stereo(new Float64Array(5 * RATE_HZ)));
    expect(record.between.figures).toMatchObject({
      integratedLufs: null,
      truePeakDbtp: null,
      clippedRunCount: 0,
    });
    expect(warningCodes(record)).toContain('too-quiet-for-loudness');
  });

  it('of half a second: no range', async () => {
    const record = await measure(stereo(stretches([[-20, 0.5]])));
    expect(record.between.figures['loudnessRangeLu']).toBeNull();
    expect(Math.abs(between(record, 'integratedLufs') + 20)).toBeLessThan(0.2);
    expect(warningCodes(record)).toContain('too-short-for-loudness');
  });
});
