import {
  createPracticeStream,
  createStimulus,
  parseDevice,
  PRACTICE_DEVICES,
  type PracticeDevice,
} from '@benchlark/dsp';
import { beforeEach, describe, expect, it } from 'vitest';
import { LiveDesk } from './live-desk';
import type { FiguresPicture, InputState, SpectrumPicture, TakeRequest } from './live-types';

const RATE_HZ = 48_000;
const BLOCK = 480;

const REQUEST: TakeRequest = {
  measure: 'tone',
  descriptor: null,
  bandLowHz: 20,
  bandHighHz: 20_000,
  isPractice: true,
  startedAt: '2026-03-04T05:06:07.000Z',
  description: '',
  calibration: null,
  baseline: null,
};
const LOOK = {
  fftLength: 16_384,
  averages: 4,
  bandLowHz: 20,
  bandHighHz: 20_000,
  tonesHz: [997],
  calibration: null,
  baseline: null,
};
const nothing = () => undefined;

/** Squares and cubes that give a second harmonic of -60 dB and a third of -80 dB at this level. */
const BENT: PracticeDevice = parseDevice({
  schema: 'benchlark-device/1',
  name: 'bent',
  sampleRateHz: null,
  seed: 5,
  stages: [
    { kind: 'polynomial', channel: 'both', coefficients: [1, 0.004, 0.0016] },
    { kind: 'noise', channel: 'both', levelDbfs: -110 },
  ],
});

/** A tone of half of full scale through a device, block by block. */
function* tone(seconds: number, device: PracticeDevice = BENT): Generator<Float32Array[]> {
  const stream = createPracticeStream(device, RATE_HZ, 2);
  for (let from = 0; from < seconds * RATE_HZ; from += BLOCK) {
    const samples = Float64Array.from(
      { length: BLOCK },
      (_, n) => 0.5 * Math.sin((2 * Math.PI * 997 * (from + n)) / RATE_HZ),
    );
    yield stream.process([samples, samples]).map((channel) => Float32Array.from(channel));
  }
}

let spectra: SpectrumPicture[];
let figures: FiguresPicture[];
let states: InputState[];
let desk: LiveDesk;
/** Goes on with the blocks, as if they came in time. */
let nowMs: number;

const feed = (blocks: Iterable<Float32Array[]>): void => {
  for (const channels of blocks) {
    nowMs += ((channels[0]?.length ?? 0) * 1000) / RATE_HZ;
    desk.take({ channels, sampleRateHz: RATE_HZ });
  }
};

beforeEach(() => {
  spectra = [];
  figures = [];
  states = [];
  nowMs = 0;
  desk = new LiveDesk(
    RATE_HZ,
    {
      onSpectrum: (picture) => spectra.push(picture),
      onFigures: (picture) => figures.push(picture),
      onState: (state) => states.push(state),
      onEnd: nothing,
    },
    () => nowMs,
  );
  desk.setLook(LOOK);
});

describe('a tone that plays', () => {
  it('is kept as a take whose harmonics are the device’s own', async () => {
    feed(tone(3));
    const { record, durationS, breaks } = await desk.keepNewest(REQUEST, nothing);
    // The harmonics of x + 0.004 x² + 0.0016 x³ at x = 0.5 sin: a2 A / 2 and a3 A² / 4 (multiple-angle formulas).
    const [second, third] = record!.channels[0]!.harmonics;
    expect(second!.levelDbr).toBeCloseTo(20 * Math.log10((0.004 * 0.5) / 2), 1);
    expect(third!.levelDbr).toBeCloseTo(20 * Math.log10((0.0016 * 0.25) / 4), 1);
    expect(durationS).toBeGreaterThan(2);
    expect(breaks).toEqual([]);
    expect(record!.capture.isPractice).toBe(true);
  });

  it('is not kept before there is enough of it', async () => {
    feed(tone(0.3));
    await expect(desk.keepNewest(REQUEST, nothing)).rejects.toThrow(/wait a second/);
  });

  it('is drawn with its line at its level', () => {
    feed(tone(2));
    const { levels, fftLength } = spectra.at(-1)!;
    expect(levels).toHaveLength(2);
    expect(Math.max(...levels[0]!)).toBeCloseTo(20 * Math.log10(0.5), 0);
    expect(fftLength).toBe(16_384);
  });

  it('gives figures of the stored measure', async () => {
    feed(tone(1));
    await expect.poll(() => figures.length).toBeGreaterThan(0);
    expect(figures[0]!.record.channels[0]!.figures['fundamentalLevelDbfs']).toBeCloseTo(-6.02, 1);
  });

  it('tells what the samples sit on, and when the input ran out of scale', () => {
    feed(tone(1));
    expect(states.at(-1)).toMatchObject({ isOverloaded: false, channelCount: 2, grid: { kind: 'float' } });
    feed(clippedTone());
    expect(states.at(-1)).toMatchObject({ isOverloaded: true });
    desk.noteChange();
    feed(tone(1));
    expect(states.at(-1)).toMatchObject({ isOverloaded: false });
  });

  function* clippedTone(): Generator<Float32Array[]> {
    for (const block of tone(0.5)) {
      yield block.map((samples) => samples.map((x) => Math.max(-1, Math.min(1, 3 * x))));
    }
  }
});

describe('a tone that rises into clipping', () => {
  it('holds no damaged block: its corners are its own', () => {
    desk.noteChange(3);
    let frame = 0;
    feed(
      (function* rising() {
        for (const block of tone(5)) {
          const gain = 10 ** (Math.min(0, -40 + (frame / RATE_HZ) * (40 / 3)) / 20);
          frame += BLOCK;
          yield block.map((samples) => samples.map((x) => Math.min(0.35, gain * x)));
        }
      })(),
    );
    expect(states.at(-1)!.breakCount).toBe(0);
  });
});

describe('damaged blocks', () => {
  /** Seven in a minute: three zeroed, two dropped, two repeated. */
  function* damaged(): Generator<Float32Array[]> {
    let index = 0;
    let before: Float32Array[] = [];
    for (const block of tone(60)) {
      index += 1;
      const isOld = [3200, 4700].includes(index);
      if ([900, 1800, 2700].includes(index)) yield block.map(({ length }) => new Float32Array(length));
      else if (isOld) yield repeatEnd(before, block);
      else if (![2200, 5300].includes(index)) yield block;
      before = block;
    }
  }

  /** A block of 256 frames that comes a second time in the place of its own. */
  function repeatEnd(before: Float32Array[], block: Float32Array[]): Float32Array[] {
    return block.map((samples, channel) => {
      const copy = samples.slice();
      copy.set(before[channel]!.subarray(BLOCK - 256), 0);
      return copy;
    });
  }

  it('are counted, and a tone’s figures come from the longest stretch between them', async () => {
    desk.startRecording();
    feed(tone(10));
    const clean = await desk.finishRecording(REQUEST, nothing);
    desk.noteChange();
    desk.startRecording();
    feed(damaged());
    const { record, breaks, settings } = await desk.finishRecording(REQUEST, nothing);
    expect(breaks.map(({ kind }) => kind).sort()).toEqual(
      ['zeroed', 'zeroed', 'zeroed', 'jump', 'jump', 'repeated', 'repeated'].sort(),
    );
    expect(settings.toS! - settings.fromS!).toBeGreaterThan(8);
    for (const key of ['thdDb', 'thdPlusNoiseDb', 'noiseDbfs', 'fundamentalLevelDbfs']) {
      const [with7, without] = [record!, clean.record!].map(({ channels }) => channels[0]!.figures[key]);
      expect(Number(with7), key).toBeCloseTo(Number(without), 1);
    }
  }, 60_000);
});

describe('a take of a stimulus', () => {
  it('is measured by what was played', async () => {
    const { source, describe: describeAs } = createStimulus('level-steps', {
      sampleRateHz: RATE_HZ,
      bitsPerSample: '32f',
      levelDbfs: -1,
    });
    const clipped = PRACTICE_DEVICES['pinched-converter']!;
    const stream = createPracticeStream(clipped, RATE_HZ, 2);
    desk.setLook({ ...LOOK, tonesHz: [] });
    feed([[new Float32Array(BLOCK), new Float32Array(BLOCK)]]);
    desk.startRecording();
    const silence = [new Float64Array(24_000), new Float64Array(24_000)];
    const push = (channels: Float64Array[]) =>
      feed([stream.process(channels).map((one) => Float32Array.from(one))]);
    push(silence);
    for (let from = 0; from < source.frameCount; from += 4800) push(await source.read(from, 4800));
    push(silence);
    const result = await desk.finishRecording(
      { ...REQUEST, measure: 'level-steps', descriptor: describeAs('') },
      nothing,
    );
    expect(result.failure).toBeNull();
    expect(result.record!.stimulus).toMatchObject({ name: 'level-steps' });
    // The knee of the published example: the left channel held at 0.763, which is -2.35 dBFS.
    expect(result.record!.findings.map(({ code }) => code)).toContain('one-sided-clipping');
  });

  it('keeps its samples where it can’t be measured', async () => {
    desk.startRecording();
    feed([[new Float32Array(4800), new Float32Array(4800)]]);
    const { record, failure, wav } = await desk.finishRecording({ ...REQUEST, measure: 'sweep' }, nothing);
    expect(record).toBeNull();
    expect(failure).toMatch(/\S/);
    expect(wav.size).toBeGreaterThan(4800 * 2 * 4);
  });
});
