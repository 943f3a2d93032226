import type { PowerSpectrum } from './power-spectrum.js';

export interface BandOptions {
  /** Power factors, one a bin, as `createWeightingFactors` makes them. */
  readonly weights?: Float64Array;
  /** Bins to sum in place of the spectrum's own, such as those with lobes refilled. */
  readonly power?: Float64Array;
}

/** Takes a bin's centre for lying on an edge when it misses it by rounding alone, in bins. */
const EDGE_TOLERANCE_BINS = 1e-9;

/**
 * Gives the first and last bin of a band: those whose centres lie inside it, edges included.
 *
 * @returns `first` > `last` when no centre lies inside
 */
export function bandBins(
  spectrum: Pick<PowerSpectrum, 'binWidthHz' | 'power'>,
  lowHz: number,
  highHz: number,
): { readonly first: number; readonly last: number } {
  const { binWidthHz, power } = spectrum;
  return {
    first: Math.max(0, Math.ceil(lowHz / binWidthHz - EDGE_TOLERANCE_BINS)),
    last: Math.min(power.length - 1, Math.floor(highHz / binWidthHz + EDGE_TOLERANCE_BINS)),
  };
}

/**
 * Sums the power of a band; a bin counts when its centre is inside.
 *
 * @param lowHz - lower edge; 0 takes the constant part in
 * @param highHz - upper edge
 * @returns mean square, FS²; 0 for an empty band
 */
export function sumBand(
  spectrum: Pick<PowerSpectrum, 'binWidthHz' | 'power'>,
  lowHz: number,
  highHz: number,
  options: BandOptions = {},
): number {
  const { first, last } = bandBins(spectrum, lowHz, highHz);
  const power = options.power ?? spectrum.power;
  const { weights } = options;
  let sum = 0;
  if (weights) for (let k = first; k <= last; k++) sum += power[k] * weights[k];
  else for (let k = first; k <= last; k++) sum += power[k];
  return sum;
}
