import { bandBins } from '../../spectrum/integrate-band.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { weightingPower, type WeightingName } from '../../weighting/weighting-curves.js';
import { binVariances } from './bin-variance.js';

/** Noise in a band and how surely it is known. */
export interface BandNoise {
  /** FS². */
  readonly meanSquare: number;
  /** Variance of it, as noise of finite duration has, FS⁴. */
  readonly variance: number;
}

/**
 * Sums a power spectrum over a band; a bin counts when its centre is inside.
 *
 * @param power - FS² a bin: the spectrum's own, or with lobes refilled; not modified
 * @param variances - of each bin before averaging; those of noise and steady lines unless given
 * @returns the sum, and its variance after the spectrum's averages
 * @see P. D. Welch, "The use of fast Fourier transform for the estimation of power spectra", IEEE Trans. AU-15, 1967
 */
export function bandNoise(
  spectrum: PowerSpectrum,
  power: Float64Array,
  band: { readonly lowHz: number; readonly highHz: number },
  weighting: WeightingName = 'none',
  variances: Float64Array = binVariances(power),
): BandNoise {
  const { first, last } = bandBins(spectrum, band.lowHz, band.highHz);
  let sum = 0;
  let variance = 0;
  for (let k = first; k <= last; k++) {
    const weight = weighting === 'none' ? 1 : weightingPower(weighting, k * spectrum.binWidthHz);
    sum += power[k] * weight;
    variance += variances[k] * weight * weight;
  }
  return { meanSquare: sum, variance: (variance * spectrum.binCorrelation) / spectrum.effectiveAverages };
}

/** The three readings of a noise that records give. */
export interface NoiseReadings {
  readonly flat: BandNoise;
  readonly aWeighted: BandNoise;
  readonly itu468Rms: BandNoise;
}

/** Reads noise flat, A-weighted and CCIR-RMS-weighted over one band. */
export function readNoise(
  spectrum: PowerSpectrum,
  power: Float64Array,
  band: { readonly lowHz: number; readonly highHz: number },
): NoiseReadings {
  const variances = binVariances(power);
  return {
    flat: bandNoise(spectrum, power, band, 'none', variances),
    aWeighted: bandNoise(spectrum, power, band, 'a', variances),
    itu468Rms: bandNoise(spectrum, power, band, 'itu-468-rms', variances),
  };
}
