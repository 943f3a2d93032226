import { DspInputError } from '../errors.js';
import { createWindow, type CosineWindow } from '../window/create-window.js';
import type { WindowName } from '../window/window-coefficients.js';
import { createRealFft, type RealFft } from './create-real-fft.js';
import type { PowerSpectrum } from './power-spectrum.js';
import { countEffectiveAverages } from './effective-averages.js';

export interface SpectrumAveragerOptions {
  readonly sampleRateHz: number;
  /** N, a power of two. */
  readonly fftLength: number;
  readonly windowName: WindowName;
  /** Share of a segment that the next one has in common with it, 0 ≤ overlap < 1. */
  readonly overlap: number;
  /** Plan and window made before, to share them between channels; each must be of the same length. */
  readonly fft?: RealFft;
  readonly window?: CosineWindow;
}

export interface SpectrumAverager {
  /** Takes the next samples, as many as the caller has. They are not modified and not kept. */
  push(samples: Float64Array): void;
  /**
   * Ends the data.
   *
   * @throws DspInputError `SEGMENT_TOO_SHORT` when fewer than N samples were pushed
   */
  finish(): PowerSpectrum;
}

/** Overlap that loses next to nothing of the data under each window, by its width. */
export function suggestedOverlap(name: WindowName): number {
  switch (name) {
    case 'rectangular':
      return 0;
    case 'hann':
      return 0.5;
    case 'blackman-harris-4':
      return 0.66;
    case 'blackman-harris-7':
    case 'hft116d':
    case 'hft144d':
      return 0.75;
    case 'hft248d':
      return 0.84;
  }
}

/**
 * Averages the power of windowed, overlapping segments of a stream (Welch).
 *
 * The last segment is aligned to the end of the data, so that nothing is left out; it then overlaps the one before it
 * by more than the others do. Holds two segments of samples, whatever the length of the stream.
 *
 * @see P. D. Welch, "The use of fast Fourier transform for the estimation of power spectra", IEEE Trans. Audio and
 *   Electroacoustics 15(2), 1967
 */
export function createSpectrumAverager(options: SpectrumAveragerOptions): SpectrumAverager {
  const { sampleRateHz, fftLength, windowName, overlap } = options;
  if (!(overlap >= 0 && overlap < 1))
    throw new DspInputError('BAD_ARGUMENT', `overlap ${overlap} isn't in 0..1`);
  const window = options.window ?? createWindow(windowName, fftLength);
  const fft = options.fft ?? createRealFft(fftLength);
  const hop = Math.max(1, Math.round(fftLength * (1 - overlap)));
  const half = fftLength / 2;
  const history = new Float64Array(2 * fftLength);
  const weighted = new Float64Array(fftLength);
  const re = new Float64Array(half + 1);
  const im = new Float64Array(half + 1);
  const sum = new Float64Array(half + 1);
  let held = 0;
  let nextEnd = fftLength;
  let averages = 0;
  let lastShift = hop;

  const addSegment = (end: number): void => {
    const start = end - fftLength;
    const shape = window.samples;
    for (let n = 0; n < fftLength; n++) weighted[n] = history[start + n] * shape[n];
    fft.transform(weighted, re, im);
    for (let k = 0; k <= half; k++) sum[k] += re[k] * re[k] + im[k] * im[k];
    averages++;
  };

  return {
    push(samples) {
      let taken = 0;
      while (taken < samples.length) {
        if (held === history.length) {
          history.copyWithin(0, fftLength);
          held -= fftLength;
          nextEnd -= fftLength;
        }
        const count = Math.min(samples.length - taken, Math.min(history.length, nextEnd) - held);
        history.set(samples.subarray(taken, taken + count), held);
        held += count;
        taken += count;
        if (held === nextEnd) {
          addSegment(nextEnd);
          nextEnd += hop;
        }
      }
    },
    finish() {
      if (averages === 0) {
        throw new DspInputError('SEGMENT_TOO_SHORT', `fewer samples than the ${fftLength} of one segment`);
      }
      const lastEnd = nextEnd - hop;
      if (held > lastEnd) {
        lastShift = held - lastEnd;
        addSegment(held);
      }
      const scale = 2 / (averages * fftLength * fftLength * window.powerGain);
      const power = new Float64Array(half + 1);
      for (let k = 0; k <= half; k++) power[k] = sum[k] * scale;
      power[0] /= 2;
      power[half] /= 2;
      return {
        sampleRateHz,
        fftLength,
        binWidthHz: sampleRateHz / fftLength,
        windowName,
        enbwBins: window.enbwBins,
        exclusionHalfWidthBins: window.exclusionHalfWidthBins,
        averages,
        ...countEffectiveAverages(window, averages, hop, lastShift),
        power,
      };
    },
  };
}
