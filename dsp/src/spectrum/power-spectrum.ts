import type { WindowName } from '../window/window-coefficients.js';

/** A one-sided power spectrum: the sum of its bins is the mean square of the signal. */
export interface PowerSpectrum {
  readonly sampleRateHz: number;
  readonly fftLength: number;
  readonly binWidthHz: number;
  readonly windowName: WindowName;
  readonly enbwBins: number;
  readonly exclusionHalfWidthBins: number;
  /** Segments averaged. */
  readonly averages: number;
  /** What they are worth in independent ones: overlapping segments share samples. */
  readonly effectiveAverages: number;
  /** Variance of a sum of neighbouring bins of white noise against that of as many independent ones. */
  readonly binCorrelation: number;
  /** Mean square per bin, FS², N/2 + 1 values. */
  readonly power: Float64Array;
}

/**
 * Scales a power spectrum for lines: a sine of peak a reads 20 lg a at its bin.
 *
 * @returns dBFS, one value a bin, -Infinity where there is no power at all; bin 0 reads a constant a as 20 lg |a|
 * @see G. Heinzel, A. Rüdiger and R. Schilling, "Spectrum and spectral density estimation by the DFT", Max Planck
 *   Institute for Gravitational Physics, 2002, section 9
 */
export function levelSpectrumDbfs(spectrum: Pick<PowerSpectrum, 'power' | 'enbwBins'>): Float64Array {
  const { power, enbwBins } = spectrum;
  const last = power.length - 1;
  const levels = new Float64Array(power.length);
  for (let k = 0; k <= last; k++) {
    const sides = k === 0 || k === last ? 1 : 2;
    levels[k] = 10 * Math.log10(sides * power[k] * enbwBins);
  }
  return levels;
}
