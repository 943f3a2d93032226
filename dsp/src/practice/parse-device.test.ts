import { describe, expect, it } from 'vitest';
import { DspInputError } from '../errors.js';
import { applyDevice } from './apply-device.js';
import { DEVICE_SCHEMA } from './device.js';
import { parseDevice } from './parse-device.js';
import { PRACTICE_DEVICES } from './practice-devices.js';
import { pass } from './testing/pass.js';

function device(...stages: unknown[]): unknown {
  return { schema: DEVICE_SCHEMA, name: 'test', sampleRateHz: 48_000, seed: 3, stages };
}

function refusalOf(act: () => unknown): DspInputError {
  try {
    act();
  } catch (error) {
    if (error instanceof DspInputError) return error;
    throw error;
  }
  throw new Error('nothing was refused');
}

describe('parseDevice', () => {
  it('takes every device of its own back from JSON', () => {
    for (const own of Object.values(PRACTICE_DEVICES)) {
      expect(parseDevice(JSON.parse(JSON.stringify(own)))).toEqual(own);
    }
  });

  it('fills what may be left out', () => {
    const read = parseDevice({ schema: DEVICE_SCHEMA, name: 'plain', stages: [{ kind: 'polarity' }] });
    expect(read).toEqual({
      schema: DEVICE_SCHEMA,
      name: 'plain',
      sampleRateHz: null,
      seed: 1,
      stages: [{ kind: 'polarity', channel: 'both' }],
    });
  });

  it.each([
    { stage: { kind: 'fuzz' }, place: 'stages[1].kind' },
    { stage: { kind: 'clip', positive: 1 }, place: 'stages[1] (clip).negative' },
    { stage: { kind: 'clip', positive: 1, negative: -1 }, place: 'stages[1] (clip).negative' },
    { stage: { kind: 'gain', gainDb: '3' }, place: 'stages[1] (gain).gainDb' },
    { stage: { kind: 'gain', gainDb: 3, gaindb: 3 }, place: 'stages[1] (gain).gaindb' },
    { stage: { kind: 'gain', gainDb: 3, channel: 'ch3' }, place: 'stages[1] (gain).channel' },
    { stage: { kind: 'clock', ppm: 3, channel: 'left' }, place: 'stages[1] (clock).channel' },
    { stage: { kind: 'quantise', bits: 16.5, dither: 'none' }, place: 'stages[1] (quantise).bits' },
    { stage: { kind: 'quantise', bits: 16, dither: 'pink' }, place: 'stages[1] (quantise).dither' },
    { stage: { kind: 'polynomial', coefficients: [] }, place: 'stages[1] (polynomial).coefficients' },
    {
      stage: { kind: 'polynomial', coefficients: [1, null] },
      place: 'stages[1] (polynomial).coefficients[1]',
    },
    { stage: { kind: 'jitter', rmsPs: 3, frequencyHz: 3 }, place: 'stages[1] (jitter)' },
    { stage: { kind: 'filter', type: 'peak', frequencyHz: 100 }, place: 'stages[1] (filter).gainDb' },
    {
      stage: { kind: 'filter', type: 'low-pass', frequencyHz: 100, order: 3, q: 2 },
      place: 'stages[1] (filter).q',
    },
    { stage: 7, place: 'stages[1]' },
  ])('refuses $stage and names $place', ({ stage, place }) => {
    const refusal = refusalOf(() => parseDevice(device({ kind: 'polarity' }, stage)));
    expect(refusal.code).toBe('BAD_DEVICE');
    expect(refusal.message).toContain(` at ${place}, `);
  });

  it.each([
    null,
    [],
    {},
    { schema: 'benchlark-device/2', name: 'x', stages: [] },
    { ...(device() as object), seed: -1 },
  ])('refuses %j', (json) => {
    expect(refusalOf(() => parseDevice(json)).code).toBe('BAD_DEVICE');
  });
});

describe('applyDevice', () => {
  it('keeps the order of the stages and the samples it was given', () => {
    const given = Float64Array.of(0.5, -0.5);
    const gain = { kind: 'gain', channel: 'both', gainDb: 20 * Math.log10(2) } as const;
    const offset = { kind: 'offset', channel: 'both', value: 0.25 } as const;
    const [gainFirst] = pass([given], 48_000, [gain, offset]);
    const [offsetFirst] = pass([given], 48_000, [offset, gain]);
    expect(gainFirst[0]).toBeCloseTo(1.25, 12);
    expect(offsetFirst[0]).toBeCloseTo(1.5, 12);
    expect([...given]).toEqual([0.5, -0.5]);
  });

  it('leaves noise alone before and after the signal, wherever the lead stands', () => {
    const [samples] = pass([new Float64Array(100).fill(0.5)], 1000, [
      { kind: 'noise', channel: 'both', levelDbfs: -80 },
      { kind: 'lead', channel: 'both', seconds: 0.2 },
    ]);
    expect(samples.length).toBe(500);
    const ends = [...samples.subarray(0, 200), ...samples.subarray(300)];
    expect(ends.every((sample) => sample !== 0 && Math.abs(sample) < 0.01)).toBe(true);
    expect(samples.subarray(200, 300).every((sample) => Math.abs(sample - 0.5) < 0.01)).toBe(true);
  });

  it.each([
    { name: 'another rate', json: device(), rate: 44_100, channels: 2 },
    {
      name: 'no right channel',
      json: device({ kind: 'polarity', channel: 'right' }),
      rate: 48_000,
      channels: 1,
    },
    {
      name: 'a tone beyond half the rate',
      json: device({ kind: 'tone', frequencyHz: 24_000, levelDbfs: 0 }),
      rate: 48_000,
      channels: 1,
    },
    {
      name: 'hum that gets there',
      json: device({ kind: 'hum', frequencyHz: 9000, levelsDbfs: [0, 0, 0] }),
      rate: 48_000,
      channels: 1,
    },
    {
      name: 'a leak between three',
      json: device({ kind: 'crosstalk', levelDb: -60, slopeDbPerOctave: 0 }),
      rate: 48_000,
      channels: 3,
    },
  ])('refuses $name', ({ json, rate, channels }) => {
    const samples = Array.from({ length: channels }, () => new Float64Array(8));
    expect(refusalOf(() => applyDevice(samples, rate, parseDevice(json))).code).toBe('BAD_DEVICE');
  });

  it('takes every device of its own, and leaves finite samples', () => {
    for (const own of Object.values(PRACTICE_DEVICES)) {
      const channels = applyDevice([new Float64Array(4800).fill(0.1), new Float64Array(4800)], 48_000, own);
      expect(channels.every((samples) => samples.length > 4800 && samples.every(Number.isFinite))).toBe(true);
    }
  });
});
