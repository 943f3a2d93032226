import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import type { BenchRecord, RecordBody } from '../../record/record.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { recognise } from '../recognise.js';
import { openMemorySource } from '../../source/open-memory-source.js';
import { getMeasure } from '../registry.js';
import { analyseSamples, numberOf } from '../testing/analyse-samples.js';

// Expected values are what the practice device was told to do: its stages are the truth.

const RATE_HZ = 48_000;
const noise: PracticeStage = { kind: 'noise', channel: 'both', levelDbfs: -100 };
const gain = (gainDb: number): PracticeStage => ({ kind: 'gain', channel: 'both', gainDb });
const clock = (ppm: number): PracticeStage => ({ kind: 'clock', channel: 'both', ppm });
const lead: PracticeStage = { kind: 'lead', channel: 'both', seconds: 0.7 };

async function play(stages: readonly PracticeStage[], options: Partial<StimulusOptions> = {}) {
  const { source, describe: describeFile } = createStimulus('programme', {
    sampleRateHz: RATE_HZ,
    bitsPerSample: 24,
    isQuick: true,
    ...options,
  });
  const channels = pass(await source.read(0, source.frameCount), RATE_HZ, stages);
  return { channels, descriptor: describeFile('') };
}

const measureAll = (channels: readonly Float64Array[], options = {}): Promise<BenchRecord> =>
  analyseSamples(getMeasure('programme'), channels, RATE_HZ, { bits: 24, ...options });

function segment(record: BenchRecord, measure: string): RecordBody {
  const found = record.segments.find((entry) => entry.measure === measure);
  if (found === undefined) throw new Error(`no segment ${measure}`);
  return found;
}

const codes = (record: BenchRecord): string[] => record.warnings.map(({ code }) => code);

describe('a programme', () => {
  it('is found by its marks alone, cut up and measured, with clock, delay and the unit’s full scale', async () => {
    const { channels } = await play([gain(-4), clock(120), lead, noise]);
    await expect(recognise(openMemorySource(channels, RATE_HZ))).resolves.toMatchObject({
      measure: 'programme',
      stimulusName: 'programme',
    });
    const record = await measureAll(channels);
    // Marks tell the clock to 1 ppm by contract; they do better.
    expect(Math.abs(Number(record.between.figures['clockOffsetPpm']) - 120)).toBeLessThan(0.3);
    expect(record.stimulus?.delayS).toBeCloseTo(0.7, 3);
    const [left] = segment(record, 'tone').channels;
    expect(numberOf(left, 'fundamentalLevelDbfs')).toBeCloseTo(-5, 2);
    // -100 dBFS over 24 kHz is 0.80 dB less in 19,980 Hz (powers in proportion to the band); 1.9 s know it to 0.1 dB.
    expect(Math.abs(numberOf(left, 'noiseDbfs') + 100.8)).toBeLessThan(0.15);
    expect(Math.abs(numberOf(segment(record, 'idle').channels[0], 'noiseDbfs') + 100.8)).toBeLessThan(0.15);
    // The tone at -60 lies at -64 in the recording: -4 dB for 0 dBFS.
    expect(record.reference.unitFullScaleDbfs).toBeCloseTo(-4, 1);
    expect(segment(record, 'tone').reference.unitFullScaleDbfs).toBeCloseTo(-4, 1);
  });

  it('keeps each part to its own place in the recording', async () => {
    const { channels, descriptor } = await play([clock(-80), lead, noise]);
    const record = await measureAll(channels);
    for (const { measure, settings } of record.segments) {
      const parts = descriptor.parts.filter((part) => part.measure === measure);
      const fromS = 0.7 + Math.min(...parts.map((part) => part.fromS));
      const toS = 0.7 + Math.max(...parts.map((part) => part.toS));
      // 80 ppm over half a minute are 2 ms; a sweep is read with the silence of 0.2 s before it.
      expect(settings.fromS).toBeGreaterThan(fromS - 0.21);
      expect(settings.toS).toBeLessThan(toS + 0.7);
    }
  });

  it('tells which part is missing when the recorder stopped early, and measures the rest', async () => {
    const { channels, descriptor } = await play([lead, noise]);
    const idle = descriptor.parts.find(({ measure }) => measure === 'idle')!;
    const end = Math.round((0.7 + idle.toS + 0.1) * RATE_HZ);
    const record = await measureAll(channels.map((samples) => samples.slice(0, end)));
    expect(record.segments.map(({ measure }) => measure)).toEqual(['tone', 'dynamic-range', 'idle']);
    const missing = record.warnings.filter(({ code }) => code === 'segment-missing');
    expect(missing.map(({ message }) => /"([^"]+)"/.exec(message)?.[1])).toEqual([
      'level-steps',
      'sweep',
      'separation',
      'modulation-pair',
      'difference-pair',
      'jitter-test',
    ]);
  });

  it('finds its parts from the end pair when the recorder started late', async () => {
    const { channels, descriptor } = await play([gain(-3), noise]);
    const tone = descriptor.parts.find(({ measure }) => measure === 'tone')!;
    const from = Math.round((tone.fromS + 0.4) * RATE_HZ);
    const record = await measureAll(channels.map((samples) => samples.slice(from)));
    expect(record.stimulus?.delayS).toBeCloseTo(-from / RATE_HZ, 2);
    expect(numberOf(segment(record, 'tone').channels[0], 'fundamentalLevelDbfs')).toBeCloseTo(-4, 2);
    expect(numberOf(segment(record, 'dynamic-range').channels[0], 'dynamicRangeDb')).toBeGreaterThan(90);
    expect(codes(record)).toContain('segment-cut');
  });

  it('follows its parts over a break where samples were lost, and says so', async () => {
    const { channels, descriptor } = await play([lead, noise]);
    const idle = descriptor.parts.find(({ measure }) => measure === 'idle')!;
    const at = Math.round((0.7 + idle.fromS + 0.5) * RATE_HZ);
    const lost = 1024;
    const broken = channels.map((samples) =>
      Float64Array.from([...samples.subarray(0, at), ...samples.subarray(at + lost)]),
    );
    const record = await measureAll(broken);
    expect(codes(record)).toContain('timeline-broken');
    // The tone's clock counts: nothing was the matter with it.
    expect(Math.abs(Number(record.between.figures['clockOffsetPpm']))).toBeLessThan(1);
    const steps = descriptor.parts.find(({ measure }) => measure === 'level-steps')!;
    const segments = record.segments.find(({ measure }) => measure === 'level-steps');
    if (segments) expect(segments.settings.fromS).toBeLessThan(0.7 + steps.fromS);
  });

  it('is not found where there are no marks', async () => {
    const { channels } = await play([noise], { isBare: true });
    await expect(measureAll(channels)).rejects.toMatchObject({ code: 'NOT_RECOGNISED' });
  });

  it('is measured whole or not at all', async () => {
    const { channels } = await play([noise]);
    await expect(measureAll(channels, { fromS: 3, toS: 9 })).rejects.toMatchObject({ code: 'BAD_ARGUMENT' });
  });

  it('gives the same record when its own settings are asked for again', async () => {
    const { channels } = await play([lead, noise]);
    const record = await measureAll(channels);
    const { fromS, toS } = record.settings;
    const again = await measureAll(channels, { fromS, toS });
    expect(JSON.stringify(again)).toBe(JSON.stringify(record));
  });
});
