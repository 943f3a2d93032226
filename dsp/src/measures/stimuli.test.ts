import { describe, expect, it } from 'vitest';
import { applyDevice } from '../practice/apply-device.js';
import { DEVICE_SCHEMA } from '../practice/device.js';
import { parseDevice } from '../practice/parse-device.js';
import { openMemorySource } from '../source/open-memory-source.js';
import type { SampleSource } from '../source/sample-source.js';
import type { StimulusDescriptor } from '../stimulus/descriptor.js';
import { createStimulus } from '../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../stimulus/stimulus-options.js';
import { recognise } from './recognise.js';
import { getMeasure } from './registry.js';
import { factsOf, numberOf, warningCodes } from './testing/analyse-samples.js';

async function play(name: string, options: StimulusOptions, stages: readonly unknown[]) {
  const { source, describe: describeFile } = createStimulus(name, options);
  const file = await source.read(0, source.frameCount);
  const device = parseDevice({
    schema: DEVICE_SCHEMA,
    name: 'bench',
    sampleRateHz: options.sampleRateHz,
    seed: 3,
    stages,
  });
  const channels = applyDevice(file, options.sampleRateHz, device);
  return {
    played: openMemorySource(channels, options.sampleRateHz),
    descriptor: describeFile('0'.repeat(64)),
    capture: factsOf(channels, options.sampleRateHz, 24),
  };
}

async function measure(
  id: string,
  played: SampleSource,
  capture: ReturnType<typeof factsOf>,
  descriptor: StimulusDescriptor | null = null,
) {
  return getMeasure(id).analyse(played, {}, { capture, descriptor });
}

describe('a stimulus played through a practice device', () => {
  // Truths are the device's own stages (closed form): gain, clock, delay and noise are given.
  it('is recognised by its marks, with delay, clock and polarity', async () => {
    const { played, capture } = await play('sine', { sampleRateHz: 48000, bitsPerSample: 24 }, [
      { kind: 'polarity', channel: 'both' },
      { kind: 'gain', channel: 'both', gainDb: -6 },
      { kind: 'clock', channel: 'both', ppm: 40 },
      { kind: 'lead', channel: 'both', seconds: 0.5 },
      { kind: 'noise', channel: 'both', levelDbfs: -90 },
    ]);
    const recognition = await recognise(played);
    expect(recognition).toMatchObject({ measure: 'tone', stimulusName: 'sine' });
    const record = await measure('tone', played, capture);
    expect(record.stimulus).toMatchObject({ name: 'sine', recognisedBy: 'marks', polarity: 'inverted' });
    expect(record.stimulus?.delayS).toBeCloseTo(0.5, 3);
    expect(Math.abs(record.stimulus!.clockOffsetPpm! - 40)).toBeLessThan(0.1);
    expect(numberOf(record.channels[0], 'fundamentalLevelDbfs')).toBeCloseTo(-7, 2);
    // The tone's level is not in the marks: it may have been scaled.
    expect(record.reference.unitFullScaleDbfs).toBeNull();
    expect(record.settings.toS - record.settings.fromS).toBeGreaterThan(9.5);
  });

  it('gives the unit’s full scale once its descriptor says the level', async () => {
    const { played, capture, descriptor } = await play(
      'sine',
      { sampleRateHz: 48000, bitsPerSample: 24, levelDbfs: -3, frequencyHz: 1234 },
      [{ kind: 'gain', channel: 'both', gainDb: -6 }],
    );
    const record = await measure('tone', played, capture, descriptor);
    expect(record.stimulus?.name).toBe('sine');
    expect(record.reference.unitFullScaleDbfs).toBeCloseTo(-6, 3);
    expect(numberOf(record.channels[0], 'fundamentalFrequencyHz')).toBeCloseTo(1234, 3);
  });

  it('shows dynamic range from the quiet body, not from the louder lead-in', async () => {
    const { played, capture } = await play('low-level-tone', { sampleRateHz: 48000, bitsPerSample: 24 }, [
      { kind: 'noise', channel: 'both', levelDbfs: -100 },
    ]);
    expect(await recognise(played)).toMatchObject({
      measure: 'dynamic-range',
      stimulusName: 'low-level-tone',
    });
    const record = await measure('dynamic-range', played, capture);
    // -100 dBFS over 0 to 24 kHz leaves -100.796 dBFS in 19,980 Hz.
    expect(Math.abs(numberOf(record.channels[0], 'dynamicRangeDb') - 100.796)).toBeLessThan(0.1);
    expect(record.reference).toEqual({ unitFullScaleDbfs: expect.closeTo(0, 2), from: 'marks' });
    expect(warningCodes(record)).not.toContain('level-assumed');
  });

  it('that began before the recorder did is measured all the same', async () => {
    const { played, capture } = await play('sine', { sampleRateHz: 48000, bitsPerSample: 24 }, []);
    const late: SampleSource = {
      ...played,
      frameCount: played.frameCount - 48000,
      read: (from, count) => played.read(from + 48000, count),
    };
    const record = await measure('tone', late, {
      ...capture,
      frameCount: late.frameCount,
      durationS: late.frameCount / 48000,
    });
    expect(record.stimulus?.delayS).toBeCloseTo(-1, 3);
    expect(warningCodes(record)).toContain('recording-cut');
    expect(numberOf(record.channels[0], 'fundamentalLevelDbfs')).toBeCloseTo(-1, 3);
  });

  it('without marks is found by its levels', async () => {
    const { played, capture } = await play('sine', { sampleRateHz: 96000, bitsPerSample: 24, isBare: true }, [
      { kind: 'lead', channel: 'both', seconds: 2 },
    ]);
    const record = await measure('tone', played, capture);
    expect(record.stimulus).toMatchObject({ recognisedBy: 'signal', delayS: null });
    expect(record.settings.fromS).toBeGreaterThan(2);
    expect(numberOf(record.channels[0], 'fundamentalLevelDbfs')).toBeCloseTo(-1, 3);
  });
});
