import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitSine } from '../tone/fit-sine.js';
import { sine } from '../testing/signals.js';
import { applyDevice } from './apply-device.js';
import { createPracticeStream, type PracticeStream } from './create-practice-stream.js';
import { DEVICE_SCHEMA, type PracticeDevice, type PracticeStage } from './device.js';

const RATE_HZ = 48_000;
const device = (...stages: PracticeStage[]): PracticeDevice => ({
  schema: DEVICE_SCHEMA,
  name: 'test',
  sampleRateHz: null,
  seed: 5,
  stages,
});

function run(
  stream: PracticeStream,
  channels: readonly Float64Array[],
  cuts: readonly number[],
): Float64Array[] {
  const result = channels.map((samples) => new Float64Array(samples.length));
  const edges = [0, ...cuts, channels[0].length];
  for (let k = 1; k < edges.length; k++) {
    const block = stream.process(channels.map((samples) => samples.subarray(edges[k - 1], edges[k])));
    block.forEach((samples, index) => result[index].set(samples, edges[k - 1]));
  }
  return result;
}

/** Everything that needs no look ahead. */
const CAUSAL: readonly PracticeStage[] = [
  { kind: 'gain', channel: 'both', gainDb: -3 },
  { kind: 'offset', channel: 'left', value: 0.01 },
  { kind: 'polynomial', channel: 'both', coefficients: [1, 1e-3, 2e-3] },
  { kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 9000, order: 3 },
  { kind: 'hum', channel: 'right', frequencyHz: 50, levelsDbfs: [-80, -90] },
  { kind: 'tone', channel: 'both', frequencyHz: 8000, levelDbfs: -95 },
  { kind: 'amplitude-modulation', channel: 'left', depthDb: -60, frequencyHz: 100 },
  { kind: 'noise', channel: 'both', levelDbfs: -100 },
  { kind: 'dead-zone', channel: 'right', width: 1e-4 },
  { kind: 'clip', channel: 'left', positive: 0.4, negative: 2 },
  { kind: 'soft-clip', channel: 'right', positive: 0.5, negative: 0.5, kneeDb: 2 },
  { kind: 'polarity', channel: 'right' },
  { kind: 'crosstalk', channel: 'both', levelDb: -70, slopeDbPerOctave: 0 },
  { kind: 'quantise', channel: 'both', bits: 24, dither: 'tpdf' },
];
const LATE: readonly PracticeStage[] = [
  { kind: 'delay', channel: 'right', samples: 3.4 },
  { kind: 'jitter', channel: 'both', peakToPeakPs: 5000, frequencyHz: 200 },
  { kind: 'clock', channel: 'both', ppm: 60 },
  { kind: 'crosstalk', channel: 'both', levelDb: -60, slopeDbPerOctave: 6 },
];

const channels = [sine(9000, RATE_HZ, 997, 0.6), sine(9000, RATE_HZ, 1499, 0.5)];

describe('a practice device on a live signal', () => {
  it('gives what it gives on the whole recording, to the last bit', () => {
    const whole = applyDevice(channels, RATE_HZ, device(...CAUSAL));
    const live = run(createPracticeStream(device(...CAUSAL), RATE_HZ, 2), channels, [128, 129, 4000]);
    expect(live).toEqual(whole);
  });

  it('is the same whatever the blocks', () => {
    const one = run(createPracticeStream(device(...CAUSAL, ...LATE), RATE_HZ, 2), channels, []);
    fc.assert(
      fc.property(fc.uniqueArray(fc.integer({ min: 1, max: 8999 }), { maxLength: 12 }), (cuts) => {
        const sorted = [...cuts].sort((a, b) => a - b);
        const split = run(createPracticeStream(device(...CAUSAL, ...LATE), RATE_HZ, 2), channels, sorted);
        expect(split).toEqual(one);
      }),
      { numRuns: 8 },
    );
  });

  it('delays by what is asked and the latency it tells', () => {
    const stream = createPracticeStream(
      device({ kind: 'delay', channel: 'both', samples: 2.25 }),
      RATE_HZ,
      1,
    );
    const [out] = run(stream, [channels[0]], [500]);
    const shift = stream.latencyFrames + 2.25;
    // A sine is known between its frames: closed form; the kernel's own errors lie 140 dB down.
    for (let n = 3000; n < 3100; n++) {
      expect(out[n]).toBeCloseTo(0.6 * Math.sin((2 * Math.PI * 997 * (n - shift)) / RATE_HZ), 7);
    }
    const whole = createPracticeStream(device({ kind: 'delay', channel: 'both', samples: 7 }), RATE_HZ, 1);
    expect(whole.latencyFrames).toBe(0);
    expect(run(whole, [channels[0]], [])[0].subarray(7)).toEqual(channels[0].subarray(0, -7));
  });

  it('runs fast by the ppm asked for', () => {
    const long = [sine(60_000, RATE_HZ, 997, 0.5)];
    const [out] = run(
      createPracticeStream(device({ kind: 'clock', channel: 'both', ppm: 80 }), RATE_HZ, 1),
      long,
      [],
    );
    const fit = fitSine(out.subarray(12_000), RATE_HZ, 997);
    expect((fit.frequencyHz / 997 - 1) * 1e6).toBeCloseTo(80, 2);
  });

  it.each([
    { slope: 6.0206, ratio: 2 },
    { slope: -6.0206, ratio: 0.5 },
    { slope: 0, ratio: 1 },
  ])('leaks at its level at 1 kHz and by $slope dB an octave', ({ slope, ratio }) => {
    const stage: PracticeStage = {
      kind: 'crosstalk',
      channel: 'right',
      levelDb: -60,
      slopeDbPerOctave: slope,
    };
    const levelAt = (hz: number) => {
      const given = [sine(48_000, RATE_HZ, hz, 1), new Float64Array(48_000)];
      const [, right] = run(createPracticeStream(device(stage), RATE_HZ, 2), given, []);
      return fitSine(right.subarray(24_000), RATE_HZ, hz).amplitude;
    };
    expect(levelAt(1000)).toBeCloseTo(1e-3, 7);
    // A difference's gain is 2 sin(πf/fs): 0.2 % under a straight line at 2 kHz.
    expect(levelAt(2000) / levelAt(1000)).toBeCloseTo(ratio, 2);
  });

  it('is exchanged while it runs: what stays goes on, what is new begins', () => {
    const [gain, clip] = [CAUSAL[0], CAUSAL[9]];
    const filter = CAUSAL[3];
    const stream = createPracticeStream(device(gain, filter), RATE_HZ, 2);
    const first = stream.process(channels.map((samples) => samples.subarray(0, 4000)));
    stream.setDevice(device(gain, filter, clip));
    const second = stream.process(channels.map((samples) => samples.subarray(4000)));
    const whole = applyDevice(channels, RATE_HZ, device(gain, filter));
    expect(first[1]).toEqual(whole[1].subarray(0, 4000));
    expect(second[1]).toEqual(whole[1].subarray(4000));
    expect(Math.max(...second[0])).toBe(0.4);
  });

  it('fills a worklet’s blocks, silence where nothing comes', () => {
    const stream = createPracticeStream(device({ kind: 'offset', channel: 'both', value: 0.25 }), RATE_HZ, 2);
    const output = [new Float32Array(128), new Float32Array(128)];
    stream.processInto([], output);
    expect(output[1][127]).toBe(0.25);
    stream.processInto([new Float32Array(128).fill(0.5)], output);
    expect(output[1][0]).toBe(0.75);
  });

  it('refuses what doesn’t fit, and goes on as it was', () => {
    const stream = createPracticeStream(device(), RATE_HZ, 2);
    const high = device({ kind: 'tone', channel: 'both', frequencyHz: 30_000, levelDbfs: -20 });
    expect(() => stream.setDevice(high)).toThrow('30000 Hz');
    expect(stream.process(channels)).toEqual(channels);
  });
});
