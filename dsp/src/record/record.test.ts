import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compareRecords } from './compare-records.js';
import { figureUnit } from './figure-unit.js';
import { parseCalibration } from './parse-calibration.js';
import { parseRecord } from './parse-record.js';
import type { BenchRecord, ChannelResult, Trace } from './record.js';
import { reduceTrace } from './reduce-trace.js';
import { roundToRecordDigits } from './round-numbers.js';
import { toRecordJson } from './to-record-json.js';

const trace: Trace = {
  xUnit: 'Hz',
  yUnit: 'dBFS',
  x: Float64Array.of(0, 1, 2),
  y: Float64Array.of(-100, -1 / 3, -90),
};
const channel: ChannelResult = {
  channel: 'left',
  figures: { thdDb: -100.12345678912, fundamentalFrequencyHz: 997.00001234567, thdPercent: null },
  limits: {},
  uncertainty: {},
  harmonics: [{ order: 2, frequencyHz: 1994, levelDbr: -100, phaseDeg: -90 }],
  components: [],
  traces: { spectrum: trace },
};
const record: BenchRecord = {
  schema: 'benchlark-record/1',
  dspVersion: '0.1.0',
  capture: {
    sha256: 'ab',
    sampleRateHz: 48000,
    channelCount: 1,
    bitsPerSample: 24,
    sampleFormat: 'integer',
    frameCount: 10,
    durationS: 1,
  },
  measure: 'tone',
  settings: {
    fromS: 0,
    toS: 1,
    window: 'w',
    fftLength: 8,
    bandLowHz: 20,
    bandHighHz: 20000,
    highestHarmonic: 10,
    calibration: null,
    baseline: null,
  },
  reference: { unitFullScaleDbfs: null, from: null },
  stimulus: null,
  channels: [channel],
  between: { figures: {}, traces: {} },
  findings: [],
  warnings: [],
  segments: [],
};
const withFigures = (figures: ChannelResult['figures']): BenchRecord => ({
  ...record,
  channels: [{ ...channel, figures }],
});

describe('toRecordJson', () => {
  it('writes keys in the contract’s order and nine significant digits', () => {
    const json = toRecordJson(record, { traces: 'full' });
    expect(Object.keys(json)).toEqual([
      'schema',
      'dspVersion',
      'measure',
      'capture',
      'settings',
      'reference',
      'stimulus',
      'channels',
      'between',
      'findings',
      'warnings',
      'segments',
    ]);
    expect(json.channels[0].figures).toEqual({
      thdDb: -100.123457,
      fundamentalFrequencyHz: 997.000012,
      thdPercent: null,
    });
    expect(json.channels[0].traces['spectrum'].y).toEqual([-100, -0.333333333, -90]);
    expect(toRecordJson(record, { traces: 'none' }).channels[0].traces).toEqual({});
  });

  it('refuses a number that isn’t finite', () => {
    expect(() => toRecordJson(withFigures({ thdDb: Number.NaN }), { traces: 'none' })).toThrow(
      expect.objectContaining({ code: 'OUT_OF_RANGE' }),
    );
  });

  it('rounds within half a unit of the ninth digit, and once only', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e12, max: 1e12 }), (value) => {
        const rounded = roundToRecordDigits(value);
        expect(Math.abs(rounded - value)).toBeLessThanOrEqual(Math.abs(value) * 5.0001e-9);
        expect(roundToRecordDigits(rounded)).toBe(rounded);
      }),
    );
  });
});

describe('reduceTrace', () => {
  it.each(['Hz', 'deg'])(
    'keeps at most 2,000 points, every one true, and the highest peak, over %s',
    (xUnit) => {
      fc.assert(
        fc.property(fc.integer({ min: 2001, max: 9000 }), fc.nat(8999), (count, at) => {
          const x = Float64Array.from({ length: count }, (_, k) => k * 0.7);
          const y = Float64Array.from({ length: count }, (_, k) => (k === at % count ? 5 : Math.sin(k)));
          const reduced = reduceTrace({ xUnit, yUnit: 'dBFS', x, y });
          expect(reduced.x.length).toBeLessThanOrEqual(2000);
          expect(reduced.x.length).toBe(reduced.y.length);
          const points = new Map(Array.from(x, (value, k) => [value, y[k]]));
          for (let k = 0; k < reduced.x.length; k++) {
            expect(points.get(reduced.x[k])).toBe(reduced.y[k]);
            if (k > 0) expect(reduced.x[k]).toBeGreaterThan(reduced.x[k - 1]);
          }
          expect(Array.from(reduced.y)).toContain(5);
        }),
        { numRuns: 20 },
      );
    },
  );

  it('leaves a short trace as it is', () => {
    expect(reduceTrace(trace)).toBe(trace);
  });
});

describe('compareRecords', () => {
  it('finds nothing between a record and its own JSON, whatever the traces', () => {
    for (const traces of ['none', 'reduced', 'full'] as const) {
      const json: unknown = JSON.parse(JSON.stringify(toRecordJson(record, { traces })));
      expect(compareRecords(parseRecord(json), record)).toEqual([]);
    }
  });

  it.each([
    { key: 'thdDb', stored: -100.123457, computed: -100.123458, differs: false },
    { key: 'thdDb', stored: -100.123457, computed: -100.12346, differs: true },
    { key: 'thdDb', stored: null, computed: -100, differs: true },
    { key: 'frequencyHz', stored: 997.000001, computed: 997.000002, differs: false },
    { key: 'frequencyHz', stored: 997.000001, computed: 997.000004, differs: true },
    { key: 'frequencyHz', stored: 1000.00001, computed: 1000.00002, differs: false },
  ])('takes $stored and $computed of $key as different: $differs', ({ key, stored, computed, differs }) => {
    const found = compareRecords(withFigures({ [key]: stored }), withFigures({ [key]: computed }));
    expect(found).toEqual(differs ? [{ path: `channels.0.figures.${key}`, stored, computed }] : []);
  });

  it('names a point of a trace that was changed', () => {
    const changed = toRecordJson(record, { traces: 'full' });
    const y = [...(changed.channels[0].traces['spectrum'].y as number[])];
    y[1] = -20;
    const channels = [{ ...channel, traces: { spectrum: { ...trace, x: [0, 1, 2], y } } }];
    expect(compareRecords({ ...changed, channels }, record).map(({ path }) => path)).toEqual([
      'channels.0.traces.spectrum.y.1',
    ]);
  });
});

describe('parseRecord and parseCalibration', () => {
  it('name the place of the first fault', () => {
    const faulty = { ...record, channels: [{ ...channel, figures: { thdDb: [] } }] };
    expect(() => parseRecord(faulty)).toThrow(/channels\.0\.figures\.thdDb/);
    const uneven = {
      ...record,
      channels: [{ ...channel, traces: { spectrum: { ...trace, x: [1], y: [] } } }],
    };
    expect(() => parseRecord(uneven)).toThrow(/equal length/);
    expect(() =>
      parseCalibration({
        schema: 'benchlark-calibration/1',
        date: '2026-03-01',
        channels: [{ channel: 'left', fullScaleVrms: 0, expandedPercent: 1 }],
      }),
    ).toThrow(/channels\.0\.fullScaleVrms/);
  });

  it('throw nothing but their own typed errors, whatever the JSON', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (json) => {
        for (const [parse, code] of [
          [parseRecord, 'BAD_RECORD'],
          [parseCalibration, 'BAD_CALIBRATION'],
        ] as const) {
          expect(() => parse(json)).toThrow(expect.objectContaining({ code }));
        }
      }),
    );
  });

  it('take a calibration that is whole', () => {
    const calibration = {
      schema: 'benchlark-calibration/1',
      date: '2026-03-01',
      channels: [{ channel: 'left', fullScaleVrms: 4.2, expandedPercent: 0.3 }],
    };
    expect(parseCalibration(JSON.parse(JSON.stringify(calibration)))).toEqual(calibration);
    const held = { ...calibration, sampleRateHz: 96_000, inputRange: 'low gain' };
    expect(parseCalibration(JSON.parse(JSON.stringify(held)))).toEqual(held);
    expect(() => parseCalibration({ ...held, sampleRateHz: 0 })).toThrow('sampleRateHz');
    expect(() => parseCalibration({ ...held, inputRange: 3 })).toThrow('inputRange');
  });
});

it.each([
  ['noiseAWeightedDbfs', 'Dbfs'],
  ['thdPercent', 'Percent'],
  ['interchannelDelayS', 'S'],
  ['integratedLufs', 'Lufs'],
  ['interchannelPolarity', null],
])('reads the unit off the key %s: %s', (key, unit) => {
  expect(figureUnit(key)).toBe(unit);
});
