import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import amplifier from '../../../test-vectors/amplifier/amplifier.json' with { type: 'json' };
import riaa from '../../../test-vectors/phono/riaa.json' with { type: 'json' };
import type { Calibration, ChannelResult, RecordBody, Trace } from '../record/record.js';
import { impedanceOfDrop, outputImpedance } from './output-impedance.js';
import { outputPower, powerOf, wattsToDbw } from './output-power.js';
import { riaaReplayDb } from './riaa-curve.js';
import { riaaDeviation } from './riaa-deviation.js';

type Body = Pick<RecordBody, 'measure' | 'channels'>;

function channelOf(channel: string, parts: Partial<ChannelResult>): ChannelResult {
  return {
    channel,
    figures: {},
    limits: {},
    uncertainty: {},
    harmonics: [],
    components: [],
    traces: {},
    ...parts,
  };
}

const toneAt = (levelDbfs: number, frequencyHz = 1000): Body => ({
  measure: 'tone',
  channels: [
    channelOf('left', {
      figures: { fundamentalLevelDbfs: levelDbfs, fundamentalFrequencyHz: frequencyHz },
    }),
  ],
});

describe('the replay curve of records', () => {
  it.each(riaa.rows)('is that of IEC 60098 at $hz Hz', ({ hz, playbackDb, playbackIecAmendmentDb }) => {
    expect(riaaReplayDb(hz)).toBeCloseTo(playbackDb, 6);
    expect(riaaReplayDb(hz, true)).toBeCloseTo(playbackIecAmendmentDb, 6);
  });

  it('has no value at 0 Hz', () => {
    expect(() => riaaReplayDb(0)).toThrow(/no value at 0 Hz/);
  });
});

describe('a phono stage against the curve', () => {
  const frequencies = riaa.rows.map(({ hz }) => hz);
  const sweep = (levelAt: (hz: number) => number): Body => ({
    measure: 'sweep',
    channels: [
      channelOf('left', {
        traces: {
          response: { xUnit: 'Hz', yUnit: 'dB', x: frequencies, y: frequencies.map((hz) => levelAt(hz)) },
        },
      }),
    ],
  });

  it('deviates nowhere where it is the published table, whatever its gain', () => {
    const table = new Map(riaa.rows.map(({ hz, playbackDb }) => [hz, playbackDb]));
    const [left] = riaaDeviation(sweep((hz) => 40 + table.get(hz)!));
    expect(Math.abs(left.greatestDb)).toBeLessThan(1e-9);
  });

  it('deviates by what was bent, at the place where it was', () => {
    const [left] = riaaDeviation(
      sweep((hz) => riaaReplayDb(hz) + (hz === 20 ? -0.7 : hz === 8000 ? 0.4 : 0)),
    );
    expect(left).toMatchObject({ greatestAtHz: 20 });
    expect(left.greatestDb).toBeCloseTo(-0.7, 9);
  });

  it('of a flat amplifier is the curve turned over', () => {
    const [left] = riaaDeviation(sweep(() => 0));
    expect(left.deviation.y[0]).toBeCloseTo(-riaa.rows[0].playbackDb, 6);
  });

  it('fed with the recording curve comes out flat, but for the amendment', () => {
    const withAmendment = sweep((hz) => riaaReplayDb(hz, true) - riaaReplayDb(hz));
    const fed = 'recording-curve' as const;
    expect(Math.abs(riaaDeviation(withAmendment, { fed, hasAmendment: true })[0].greatestDb)).toBeLessThan(
      1e-9,
    );
    expect(riaaDeviation(withAmendment, { fed })[0].greatestDb).toBeCloseTo(-3.01, 1);
  });

  it('needs a sweep that holds 1 kHz', () => {
    expect(() => riaaDeviation(toneAt(0))).toThrow(/a sweep's record is needed, not one of tone/);
    const high: Body = {
      measure: 'sweep',
      channels: [
        channelOf('left', { traces: { response: { xUnit: 'Hz', yUnit: 'dB', x: [2000, 3000], y: [0, 0] } } }),
      ],
    };
    expect(() => riaaDeviation(high)).toThrow(/does not reach 1 kHz/);
  });
});

describe('output impedance by a change of load', () => {
  const { openCircuitV, loadedV, loadOhm, outputImpedanceOhm, dampingFactor } = amplifier.example;

  it('is that of the worked example: 10.00 V open, 9.90 V into 8 ohms', () => {
    const open = toneAt(20 * Math.log10(openCircuitV));
    const loaded = toneAt(20 * Math.log10(loadedV));
    const [left] = outputImpedance(open, loaded, { loadOhm });
    expect(left.outputImpedanceOhm).toBeCloseTo(outputImpedanceOhm, 9);
    expect(left.dampingFactor).toBeCloseTo(dampingFactor, 6);
    expect(left.levelDropDb).toBeCloseTo(-amplifier.example.levelDropDb, 9);
  });

  it('is told back whatever it was (Ohm’s law: a divider of Z and R)', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.05, max: 100, noNaN: true }),
        fc.double({ min: 1, max: 600, noNaN: true }),
        (z, r) => {
          const dropDb = 20 * Math.log10((r + z) / r);
          fc.pre(dropDb > 0.01);
          const told = impedanceOfDrop(dropDb, { loadOhm: r });
          expect(told.outputImpedanceOhm! / z).toBeCloseTo(1, 6);
        },
      ),
    );
  });

  it('is a bound where the drop is no greater than its own uncertainty', () => {
    // A damping factor above 1,000 asks for levels good to 0.001 dB: 8 ohms and 4 milliohms drop 0.0043 dB.
    const told = impedanceOfDrop(0.002, { loadOhm: 8 });
    expect(told).toMatchObject({ outputImpedanceOhm: null, dampingFactor: null });
    expect(told.belowOhm).toBeCloseTo(8 * (10 ** (0.0048284 / 20) - 1), 6);
    expect(impedanceOfDrop(-0.001, { loadOhm: 8 }).belowOhm).toBeGreaterThan(0);
  });

  it('refuses exchanged takes: no passive load raises the level', () => {
    expect(() => outputImpedance(toneAt(-1), toneAt(0), { loadOhm: 8 })).toThrow(/1\.000 dB louder/);
  });

  it('refuses takes that are not of one tone', () => {
    expect(() => outputImpedance(toneAt(0, 1000), toneAt(-0.1, 1100), { loadOhm: 8 })).toThrow(
      /tones .* differ/,
    );
    expect(() => outputImpedance(toneAt(0), toneAt(0), { loadOhm: 0 })).toThrow(/load of 0 ohm/);
  });
});

describe('output power', () => {
  it.each(amplifier.power)('$vrms V into $r ohms is $watt W', ({ vrms, r, watt, dBW }) => {
    expect(powerOf(vrms, r)).toBeCloseTo(watt, 6);
    expect(wattsToDbw(powerOf(vrms, r))).toBeCloseTo(dBW, 6);
  });

  const calibration: Calibration = {
    schema: 'benchlark-calibration/1',
    date: '2026-01-02',
    channels: [{ channel: 'left', fullScaleVrms: 28.284271247, expandedPercent: 1 }],
  };
  const steps = (points: readonly (readonly [played: number, measured: number, thdDb: number])[]): Body => {
    const trace = (at: 1 | 2, yUnit: string): Trace => ({
      xUnit: 'dBFS',
      yUnit,
      x: points.map(([played]) => played),
      y: points.map((point) => point[at]),
    });
    return {
      measure: 'level-steps',
      channels: [
        channelOf('left', { traces: { measuredLevel: trace(1, 'dBFS'), thdPlusNoise: trace(2, 'dB') } }),
      ],
    };
  };

  it('at a limit lies on the line in decibels between the steps around it', () => {
    // Full scale is 28.28 V, 100 W into 8 ohms; -40 dB is 1 %: halfway from -60 to -20 dB, at -0.5 dB of 100 W.
    const record = steps([
      [0, 0, -20],
      [-1, -1, -60],
      [-2, -2, -70],
      [-20, -20, -80],
    ]);
    const [{ atLimits, gainDb }] = outputPower(record, { loadOhm: 8, calibration, inputFullScaleVrms: 2 });
    const [tenth, one] = atLimits;
    expect(one.powerW).toBeCloseTo(100 * 10 ** -0.05, 3);
    expect(one.lowW).toBeCloseTo(79.43, 2);
    expect(one.highW).toBeCloseTo(100, 3);
    expect(tenth.powerW).toBeCloseTo(79.43, 2);
    expect(gainDb).toBeCloseTo(20 * Math.log10(28.284271247 / 2), 6);
  });

  it('says so where a limit is never reached, or never kept', () => {
    const clean = steps([
      [0, 0, -90],
      [-10, -10, -95],
    ]);
    const bad = steps([
      [0, 0, -20],
      [-10, -10, -25],
    ]);
    expect(outputPower(clean, { loadOhm: 8, calibration })[0].atLimits[1]).toMatchObject({
      powerW: null,
      why: 'never-reached',
    });
    expect(outputPower(bad, { loadOhm: 8, calibration })[0].atLimits[0].why).toBe('exceeded-throughout');
  });

  it('reaches 1 % where the Fourier series of a clipped sine has it, 0.25 dB beyond the onset', () => {
    // The steps' THD from the series itself, at 0.05 dB: two-sided clipping at c reaches 1 % at a peak of c / 0.971487.
    const clip = 0.5;
    const points = Array.from({ length: 200 }, (_, n) => {
      const played = -n * 0.05;
      const peak = 10 ** (played / 20);
      const { fundamental, thd } = clippedSine(peak, clip);
      return [played, 20 * Math.log10(fundamental), 20 * Math.log10(thd)] as const;
    });
    const [{ atLimits }] = outputPower(steps(points), { loadOhm: 8, calibration });
    const peak = clip / amplifier.clipLevelForThd['1'].twoSided;
    const { fundamental } = clippedSine(peak, clip);
    expect(wattsToDbw(atLimits[1].powerW!)).toBeCloseTo(20 + 20 * Math.log10(fundamental), 2);
  });

  it('needs level steps, a load and a calibration', () => {
    const record = steps([[0, 0, -20]]);
    expect(() => outputPower(toneAt(0), { loadOhm: 8, calibration })).toThrow(/record of level steps/);
    expect(() => outputPower(record, { loadOhm: -8, calibration })).toThrow(/load of -8 ohm/);
    expect(() => outputPower(record, { loadOhm: 8, calibration: { ...calibration, channels: [] } })).toThrow(
      /no calibration of the channel left/,
    );
  });
});

/** A sine of this peak cut off at ±clip: fundamental and THD by Parseval over one finely sampled period. */
function clippedSine(peak: number, clip: number): { fundamental: number; thd: number } {
  const count = 8192;
  let [square, sine] = [0, 0];
  for (let n = 0; n < count; n++) {
    const wave = Math.sin((2 * Math.PI * (n + 0.5)) / count);
    const value = Math.max(-clip, Math.min(clip, peak * wave));
    square += value ** 2 / count;
    sine += (2 * value * wave) / count;
  }
  return { fundamental: sine, thd: Math.sqrt(Math.max(1e-20, square - sine ** 2 / 2)) / (sine / Math.SQRT2) };
}
