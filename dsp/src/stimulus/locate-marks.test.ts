import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../practice/device.js';
import { interpolate } from '../practice/stages/interpolate.js';
import { pass } from '../practice/testing/pass.js';
import { openMemorySource } from '../source/open-memory-source.js';
import { sliceSource } from '../source/slice-source.js';
import { createStimulus } from './create-stimulus.js';
import { locateMarks, type MarkMatch } from './locate-marks.js';
import type { StimulusOptions } from './stimulus-options.js';

// Expected delays and clocks are what the practice device was told to do; there is no outside source for them.

const RATE_HZ = 48_000;

async function play(
  name: string,
  stages: readonly PracticeStage[],
  options: Partial<StimulusOptions> = {},
  rateHz = RATE_HZ,
) {
  const stimulus = createStimulus(name, { sampleRateHz: rateHz, bitsPerSample: 24, ...options });
  const { source } = stimulus;
  const channels = pass(await source.read(0, source.frameCount), rateHz, stages);
  return { source: openMemorySource(channels, rateHz), descriptor: stimulus.describe('') };
}

function found(match: MarkMatch | null): MarkMatch {
  if (!match) throw new Error('no marks were found');
  return match;
}

const noise = (levelDbfs: number): PracticeStage => ({ kind: 'noise', channel: 'both', levelDbfs });
const clock = (ppm: number): PracticeStage => ({ kind: 'clock', channel: 'both', ppm });
const delay = (samples: number): PracticeStage => ({ kind: 'delay', channel: 'both', samples });
const lead = (seconds: number): PracticeStage => ({ kind: 'lead', channel: 'both', seconds });
const gain = (gainDb: number): PracticeStage => ({ kind: 'gain', channel: 'both', gainDb });
const invert: PracticeStage = { kind: 'polarity', channel: 'both' };

describe('delay, clock and polarity', () => {
  it.each([
    { title: 'nothing done', stages: [], delayFrames: 0, ppm: 0 },
    { title: 'delay between frames', stages: [delay(1234.567), noise(-95)], delayFrames: 1234.567, ppm: 0 },
    { title: 'clock fast', stages: [clock(200), lead(0.6), noise(-95)], delayFrames: 28_800, ppm: 200 },
    { title: 'clock slow', stages: [clock(-200), lead(0.6), noise(-95)], delayFrames: 28_800, ppm: -200 },
    {
      title: 'clock and delay',
      stages: [clock(35.1), delay(77.25), noise(-95)],
      delayFrames: 77.25,
      ppm: 35.1,
    },
    { title: 'low level', stages: [gain(-40), delay(10.5), noise(-110)], delayFrames: 10.5, ppm: 0 },
    {
      title: 'hum and its multiples',
      stages: [
        { kind: 'hum', channel: 'both', frequencyHz: 50.02, levelsDbfs: [-30, -36, -50] },
        delay(10.5),
      ],
      delayFrames: 10.5,
      ppm: 0,
    },
  ] as const)('are exact: $title', async ({ stages, delayFrames, ppm }) => {
    const { source } = await play('sine', stages);
    const match = found(await locateMarks(source));
    expect(match).toMatchObject({ code: 1, stimulusName: 'sine', polarity: 'same' });
    // Asked: a hundredth of a sample, and 1 ppm over 10 s.
    expect(Math.abs((match.delayS ?? NaN) * RATE_HZ - delayFrames)).toBeLessThan(0.01);
    expect(Math.abs((match.clockOffsetPpm ?? NaN) - ppm)).toBeLessThan(0.1);
  });

  it('sees an inverted chain', async () => {
    const { source } = await play('low-level-tone', [invert, gain(-3), lead(0.1), noise(-100)]);
    expect(await locateMarks(source)).toMatchObject({ stimulusName: 'low-level-tone', polarity: 'inverted' });
  });

  it('bears as much noise as the marks are loud', async () => {
    const { source } = await play('sine', [clock(-80), lead(0.25), noise(-20)]);
    const match = found(await locateMarks(source));
    expect(match.delayS).toBeCloseTo(0.25, 4);
    expect(Math.abs((match.clockOffsetPpm ?? NaN) + 80)).toBeLessThan(1);
    expect(match.confidence).toBeLessThan(0.95);
  });

  it.each([
    [44_100, 96_000],
    [96_000, 48_000],
    [192_000, 44_100],
  ])('a file at %i Hz is found in a recording at %i Hz', async (fileHz, recordingHz) => {
    const { source } = createStimulus('sine', { sampleRateHz: fileHz, bitsPerSample: 24 });
    const [samples] = await source.read(0, source.frameCount);
    const step = fileHz / recordingHz;
    // The marks end at 6 kHz, so that nothing folds even where the recording's rate is the lower one.
    const recorded = interpolate([samples], Math.floor(samples.length / step), (n) => (n - 500.5) * step);
    const match = found(await locateMarks(openMemorySource(recorded, recordingHz)));
    expect(Math.abs((match.delayS ?? NaN) * recordingHz - 500.5)).toBeLessThan(0.01);
    expect(Math.abs(match.clockOffsetPpm ?? NaN)).toBeLessThan(0.1);
  });

  it('says where the steady body lies', async () => {
    const { source, descriptor } = await play('sine', [clock(100), lead(0.5)]);
    const match = found(await locateMarks(source));
    expect(match.bodyFromS).toBeCloseTo(0.5 + descriptor.parts[0].fromS / 1.0001, 6);
    expect(match.bodyToS).toBeCloseTo(0.5 + descriptor.parts[0].toS / 1.0001, 6);
  });

  it('looks in the channel that carries the file', async () => {
    const { source } = await play('sine', [noise(-100), { kind: 'offset', channel: 'left', value: 0.5 }], {
      channels: 'right',
    });
    expect(await locateMarks(source)).toMatchObject({ code: 63, stimulusName: null });
  });

  it('takes one play of two', async () => {
    const { source } = await play('sine', [noise(-90)]);
    const [once] = await source.read(0, source.frameCount);
    const twice = new Float64Array(2 * once.length);
    twice.set(once);
    twice.set(once, once.length);
    const match = found(await locateMarks(openMemorySource([twice], RATE_HZ)));
    const delays = [0, once.length / RATE_HZ];
    expect(Math.min(...delays.map((delayS) => Math.abs(delayS - (match.delayS ?? NaN))))).toBeLessThan(1e-6);
    expect(Math.abs(match.clockOffsetPpm ?? NaN)).toBeLessThan(0.1);
  });
});

describe('a recording that lacks an end', () => {
  it.each(['sine', 'low-level-tone'])('started late, %s', async (name) => {
    const { source, descriptor } = await play(name, [clock(50), noise(-100)]);
    const late = sliceSource(source, 5 * RATE_HZ, source.frameCount);
    const match = found(await locateMarks(late));
    expect(match.stimulusName).toBe(name);
    // One gap of 0.3 s tells the clock less well than 10 s do, and the file's length is reckoned with it.
    expect(match.delayS).toBeCloseTo(-5, 4);
    expect(match.bodyFromS).toBe(0);
    expect(match.bodyToS).toBeCloseTo(descriptor.parts[0].toS / 1.00005 - 5, 4);
  });

  it.each(['sine', 'low-level-tone'])('stopped early, %s', async (name) => {
    const { source } = await play(name, [lead(0.2), noise(-100)]);
    const match = found(await locateMarks(sliceSource(source, 0, 6 * RATE_HZ)));
    expect(match.stimulusName).toBe(name);
    expect(match.delayS).toBeCloseTo(0.2, 6);
    expect(match.bodyToS).toBe(6);
  });

  it("started between the lead-in's end and the marks", async () => {
    const { source } = await play('sine', [noise(-100)]);
    const match = found(await locateMarks(sliceSource(source, 98_400, 8 * RATE_HZ)));
    expect(match.delayS).toBeCloseTo(-2.05, 6);
  });

  it('gives no clock where noise leaves one gap uncertain', async () => {
    const { source } = await play('sine', [noise(-20)]);
    const match = found(await locateMarks(sliceSource(source, 0, 6 * RATE_HZ)));
    expect(match.clockOffsetPpm).toBeNull();
    expect(match.delayS).toBeCloseTo(0, 4);
  });

  it('gives no delay when nothing says how long the file is', async () => {
    const { source, descriptor } = await play('sine', [noise(-100)], { durationS: 4 });
    const late = sliceSource(source, 4 * RATE_HZ, source.frameCount);
    expect(await locateMarks(late)).toMatchObject({ code: 63, delayS: null });
    expect((await locateMarks(late, { descriptor }))?.delayS).toBeCloseTo(-4, 5);
  });
});

describe('files of other parameters', () => {
  it('are placed by the marks alone, and named and timed with their descriptor', async () => {
    const { source, descriptor } = await play('sine', [clock(-120), lead(0.3), noise(-95)], {
      frequencyHz: 7000,
      durationS: 5,
    });
    const alone = found(await locateMarks(source));
    expect(alone).toMatchObject({ code: 63, stimulusName: null });
    expect(alone.delayS).toBeCloseTo(0.3, 5);
    expect(Math.abs((alone.clockOffsetPpm ?? NaN) + 120)).toBeLessThan(1);
    const told = found(await locateMarks(source, { descriptor }));
    expect(told.stimulusName).toBe('sine');
    expect(Math.abs((told.clockOffsetPpm ?? NaN) + 120)).toBeLessThan(0.1);
    expect(told.bodyToS - told.bodyFromS).toBeCloseTo(4.96, 2);
  });

  it("don't fit the descriptor of another file, nor of a bare one", async () => {
    const { source } = await play('sine', [noise(-100)], { durationS: 2 });
    const other = createStimulus('sine', { sampleRateHz: RATE_HZ, bitsPerSample: 24 }).describe('');
    const bare = createStimulus('sine', { sampleRateHz: RATE_HZ, bitsPerSample: 24, isBare: true }).describe(
      '',
    );
    expect(await locateMarks(source, { descriptor: other })).toBeNull();
    expect(await locateMarks(source, { descriptor: bare })).toBeNull();
  });
});

describe('while it works', () => {
  it('tells its progress and stops when asked', async () => {
    const { source } = await play('sine', []);
    const shares: number[] = [];
    await locateMarks(source, { onProgress: (share) => shares.push(share) });
    expect(shares.at(-1)).toBe(1);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    const cancelled = locateMarks(source, { signal: { aborted: true } });
    await expect(cancelled).rejects.toMatchObject({ code: 'CANCELLED' });
  });
});
