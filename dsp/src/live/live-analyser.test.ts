import { describe, expect, it } from 'vitest';
import { createSpectrumAverager } from '../spectrum/create-spectrum-averager.js';
import { levelSpectrumDbfs } from '../spectrum/power-spectrum.js';
import { sine, whiteNoise } from '../testing/signals.js';
import { createLiveAnalyser, type LiveAnalyser } from './live-analyser.js';

const RATE_HZ = 48_000;
const LENGTH = 16_384;
const make = (averages = 1): LiveAnalyser =>
  createLiveAnalyser({ sampleRateHz: RATE_HZ, channelCount: 2, fftLength: LENGTH, averages });

function feed(analyser: LiveAnalyser, samples: Float64Array, block = 2048): void {
  for (let at = 0; at < samples.length; at += block) {
    const part = Float32Array.from(samples.subarray(at, at + block));
    analyser.push([part, part.map((x) => x / 2)]);
  }
}

const top = (levels: Float64Array): number =>
  levels.reduce((most, level) => Math.max(most, level), -Infinity);

describe('the rolling spectrum', () => {
  it('reads a tone on a bin at its level, the other channel 6.02 dB lower', () => {
    const analyser = make();
    expect(analyser.spectrum()).toBeNull();
    // 20 lg 0.5 = -6.0206 dBFS, closed form.
    feed(analyser, sine(LENGTH, RATE_HZ, (RATE_HZ * 341) / LENGTH, 0.5));
    const [left, right] = analyser.spectrum() ?? [];
    expect(top(left)).toBeCloseTo(-6.0206, 3);
    expect(left.indexOf(top(left))).toBe(341);
    expect(top(right)).toBeCloseTo(-12.0412, 3);
  });

  it('averages noise as the stored measures do', () => {
    const noise = whiteNoise(8 * LENGTH, 0.1, 12).map(Math.fround);
    const analyser = make(8);
    let left = new Float64Array(0);
    for (let k = 0; k < 8; k++) {
      feed(analyser, noise.subarray(k * LENGTH, (k + 1) * LENGTH));
      [left] = analyser.spectrum() ?? [];
    }
    const averager = createSpectrumAverager({
      sampleRateHz: RATE_HZ,
      fftLength: LENGTH,
      windowName: 'blackman-harris-7',
      overlap: 0,
    });
    averager.push(noise);
    const expected = levelSpectrumDbfs(averager.finish());
    expect(analyser.averaged).toBe(8);
    for (let k = 8; k < LENGTH / 2; k += 97) expect(left[k]).toBeCloseTo(expected[k], 6);
  });

  it('leaves damaged frames out', () => {
    const analyser = make(4);
    const tone = sine(3 * LENGTH, RATE_HZ, (RATE_HZ * 341) / LENGTH, 0.5);
    feed(analyser, tone.subarray(0, LENGTH));
    const [before] = analyser.spectrum() ?? [];
    feed(analyser, new Float64Array(2048));
    analyser.skip();
    feed(analyser, tone.subarray(LENGTH, 2 * LENGTH - 2048));
    const [held] = analyser.spectrum() ?? [];
    expect(held).toEqual(before);
    expect(analyser.newest(LENGTH)[0].length).toBe(LENGTH - 2048);
    feed(analyser, tone.subarray(2 * LENGTH - 2048, 2 * LENGTH));
    const [after] = analyser.spectrum() ?? [];
    expect(top(after)).toBeCloseTo(-6.0206, 3);
    expect(analyser.averaged).toBe(2);
  });

  it('gives the newest frames in their order', () => {
    const analyser = make();
    const ramp = Float64Array.from({ length: LENGTH + 100 }, (_, n) => n);
    feed(analyser, ramp, 500);
    expect(analyser.newest(3)).toEqual([
      Float64Array.of(LENGTH + 97, LENGTH + 98, LENGTH + 99),
      Float64Array.of(LENGTH + 97, LENGTH + 98, LENGTH + 99).map((x) => x / 2),
    ]);
  });

  it('refuses a length that can’t be', () => {
    const options = { sampleRateHz: RATE_HZ, channelCount: 1, averages: 1 };
    expect(() => createLiveAnalyser({ ...options, fftLength: 5000 })).toThrow('5000 points');
  });
});
