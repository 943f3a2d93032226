import { DspInputError } from '../errors.js';
import { createRealFft } from '../spectrum/create-real-fft.js';
import { createWindow } from '../window/create-window.js';

export interface LiveAnalyserOptions {
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** A power of two, 1,024 to 262,144. */
  readonly fftLength: number;
  /** Spectra averaged in power: evenly until there are so many, then the newest weighs 1/averages. */
  readonly averages: number;
}

/** Rolling analysis of an input: nothing is claimed for its readings, which are never stored. */
export interface LiveAnalyser {
  /** Frames taken so far. */
  readonly frame: number;
  /** How many spectra stand in the average. */
  readonly averaged: number;
  push(channels: readonly ArrayLike<number>[]): void;
  /** Leaves the frames before the one that comes next out of every later spectrum. */
  skip(): void;
  /** Begins the average anew. */
  restart(): void;
  /**
   * Averages in the newest window where there is a whole one of undamaged frames.
   *
   * @returns one array a channel, dBFS (a full-scale sine reads 0 dBFS at the top of its lobe) from 0 Hz to half the rate
   *   in fftLength / 2 + 1 bins; null before the first whole window
   */
  spectrum(): Float64Array<ArrayBuffer>[] | null;
  /** The newest frames, at most fftLength, one array a channel; fewer where frames were skipped. */
  newest(count: number): Float64Array[];
}

const WINDOW = 'blackman-harris-7';
const LOWEST_POWER = 1e-20;

/**
 * Makes the rolling spectrum of a live input: the window of the stored measures, averaged in power.
 *
 * @throws DspInputError `BAD_ARGUMENT` for a length that is no power of two or out of its range
 */
export function createLiveAnalyser(options: LiveAnalyserOptions): LiveAnalyser {
  const { channelCount, fftLength, averages } = options;
  if (!(fftLength >= 1024 && fftLength <= 262_144 && Number.isInteger(Math.log2(fftLength)))) {
    throw new DspInputError('BAD_ARGUMENT', `a live spectrum of ${fftLength} points can't be`);
  }
  const half = fftLength / 2;
  const fft = createRealFft(fftLength);
  const window = createWindow(WINDOW, fftLength);
  // RMS of a sine is its peak over √2: a full-scale sine then reads 0 dB.
  const scale = (2 / (fftLength * window.coherentGain)) ** 2;
  const mask = fftLength - 1;
  const rings = Array.from({ length: channelCount }, () => new Float64Array(fftLength));
  const power = Array.from({ length: channelCount }, () => new Float64Array(half + 1));
  const weighted = new Float64Array(fftLength);
  const re = new Float64Array(half + 1);
  const im = new Float64Array(half + 1);
  let frame = 0;
  let goodFrom = 0;
  let averaged = 0;

  const addTo = (sum: Float64Array, ring: Float64Array, weight: number): void => {
    for (let n = 0; n < fftLength; n++) weighted[n] = ring[(frame + n) & mask] * window.samples[n];
    fft.transform(weighted, re, im);
    for (let k = 0; k <= half; k++) {
      sum[k] += weight * (scale * (re[k] * re[k] + im[k] * im[k]) - sum[k]);
    }
  };
  return {
    get frame() {
      return frame;
    },
    get averaged() {
      return averaged;
    },
    push: (channels) => {
      const count = channels[0]?.length ?? 0;
      rings.forEach((ring, index) => {
        const samples = channels[Math.min(index, channels.length - 1)];
        for (let n = 0; n < count; n++) ring[(frame + n) & mask] = samples[n];
      });
      frame += count;
    },
    skip: () => {
      goodFrom = frame;
    },
    restart: () => {
      averaged = 0;
    },
    spectrum: () => {
      if (frame - goodFrom >= fftLength) {
        averaged = Math.min(averages, averaged + 1);
        if (averaged === 1) power.forEach((sum) => sum.fill(0));
        power.forEach((sum, index) => addTo(sum, rings[index], 1 / averaged));
      } else if (averaged === 0) return null;
      return power.map((sum) => sum.map((value) => 10 * Math.log10(Math.max(LOWEST_POWER, value))));
    },
    newest: (count) => {
      const held = Math.min(count, fftLength, frame - goodFrom);
      return rings.map((ring) =>
        Float64Array.from({ length: held }, (_, n) => ring[(frame - held + n) & mask]),
      );
    },
  };
}
