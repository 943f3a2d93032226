import { createRealFft } from '../../spectrum/create-real-fft.js';
import type { SampleSource } from '../../source/sample-source.js';
import { createWindow } from '../../window/create-window.js';
import { findStrongestLine, type FoundLine } from './find-line.js';
import type { FramePlan } from './plan-frames.js';
import type { FrameRange } from './stream-frames.js';
import { TONE_PROMINENCE, type ToneSearch } from './tone-tracker.js';

/** Where a channel's tone is, roughly. */
export interface ToneSight {
  readonly frequencyHz: number;
  readonly search: ToneSearch;
}

/** A tone may stray this far from where it was seen: cheap clocks and worn belts stay well inside. */
const STRAY_SHARE = 0.02;
const LOWEST_TONE_HZ = 10;
const HIGHEST_SHARE_OF_RATE = 0.49;

/**
 * Looks for each channel's tone in three frames of a segment, under a window narrow enough for the shortest record.
 *
 * @param preferred - where to look first: near a known stimulus's frequency; null for anywhere
 * @returns one entry a channel, null where no line stands 20 dB out of the noise
 */
export async function lookForTones(
  source: SampleSource,
  range: FrameRange,
  plan: FramePlan,
  preferred: ToneSearch | null,
): Promise<(ToneSight | null)[]> {
  const { fftLength, starts } = plan;
  const fft = createRealFft(fftLength);
  const window = createWindow('hann', fftLength);
  const re = new Float64Array(fftLength / 2 + 1);
  const im = new Float64Array(fftLength / 2 + 1);
  const powers = Array.from({ length: source.channelCount }, () => new Float64Array(fftLength / 2 + 1));
  const looks = new Set([starts[0], starts[starts.length >> 1], starts[starts.length - 1]]);
  for (const start of looks) {
    const block = await source.read(range.from + start, fftLength);
    block.forEach((samples, channel) => {
      if (samples.length < fftLength) return;
      const mean = samples.reduce((sum, value) => sum + value, 0) / fftLength;
      fft.transform(
        samples.map((value, n) => (value - mean) * window.samples[n]),
        re,
        im,
      );
      for (let k = 0; k < re.length; k++) powers[channel][k] += re[k] * re[k] + im[k] * im[k];
    });
  }
  const half = window.exclusionHalfWidthBins;
  const binWidthHz = source.sampleRateHz / fftLength;
  const look = (power: Float64Array, { lowHz, highHz }: ToneSearch): FoundLine | null => {
    const bins = { power, exclusionHalfWidthBins: half, effectiveAverages: 1 };
    const line = findStrongestLine(bins, Math.max(lowHz / binWidthHz, half), highHz / binWidthHz);
    return line !== null && line.prominence >= TONE_PROMINENCE ? line : null;
  };
  const anywhere = { lowHz: LOWEST_TONE_HZ, highHz: HIGHEST_SHARE_OF_RATE * source.sampleRateHz };
  return powers.map((power) => {
    const line = (preferred === null ? null : look(power, preferred)) ?? look(power, anywhere);
    if (line === null) return null;
    const frequencyHz = line.bin * binWidthHz;
    const reach = Math.max(STRAY_SHARE * frequencyHz, 2 * binWidthHz);
    return { frequencyHz, search: { lowHz: frequencyHz - reach, highHz: frequencyHz + reach } };
  });
}
