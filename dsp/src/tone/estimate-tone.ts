import { createSpectrumAverager } from '../spectrum/create-spectrum-averager.js';
import { bandBins } from '../spectrum/integrate-band.js';
import type { PowerSpectrum } from '../spectrum/power-spectrum.js';
import type { WindowName } from '../window/window-coefficients.js';
import { windowResponse } from '../window/window-response.js';

export interface ToneEstimate {
  readonly frequencyHz: number;
  /** Mean square of the line, from the sum over its lobe, FS²; the noise under it is not taken off. */
  readonly power: number;
}

export interface ToneSearch {
  /** Lowest and highest frequency looked at; by default all but the lobe at 0 Hz. */
  readonly lowHz?: number;
  readonly highHz?: number;
}

/**
 * Gives how far a line lies from its highest bin, from the powers of the two neighbours: their ratio fixes the offset
 * through the window's own transform.
 *
 * @returns bins, -0.5 to 0.5
 */
function offsetFromNeighbours(name: WindowName, before: number, after: number): number {
  if (!(before + after > 0)) return 0;
  const excess = (d: number): number => {
    const b = windowResponse(name, -1 - d) ** 2;
    const a = windowResponse(name, 1 - d) ** 2;
    return a * before - b * after;
  };
  let low = -0.5;
  let high = 0.5;
  // `excess` grows from negative to positive with d; 40 halvings reach 1e-12 bin.
  for (let i = 0; i < 40; i++) {
    const middle = (low + high) / 2;
    if (excess(middle) < 0) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/**
 * Finds the strongest line of a power spectrum, off the bins.
 *
 * @returns null when there is no power in the band looked at
 */
export function findStrongestTone(spectrum: PowerSpectrum, search: ToneSearch = {}): ToneEstimate | null {
  const { power, binWidthHz, exclusionHalfWidthBins: halfWidth, windowName } = spectrum;
  const { first, last } = bandBins(spectrum, search.lowHz ?? 0, search.highHz ?? Infinity);
  let peak = -1;
  for (let k = Math.max(first, search.lowHz === undefined ? halfWidth + 1 : 1); k <= last; k++) {
    if (k < power.length - 1 && power[k] > 0 && (peak < 0 || power[k] > power[peak])) peak = k;
  }
  if (peak < 0) return null;
  const offset = offsetFromNeighbours(windowName, power[peak - 1], power[peak + 1]);
  let sum = 0;
  const to = Math.min(power.length - 1, Math.floor(peak + offset + halfWidth));
  for (let k = Math.max(0, Math.ceil(peak + offset - halfWidth)); k <= to; k++) sum += power[k];
  return { frequencyHz: (peak + offset) * binWidthHz, power: sum };
}

/** Longest transform that an estimate takes. */
const LONGEST_FFT = 262_144;

/**
 * Finds the strongest tone of a segment from the largest power of two of its samples, up to 262,144.
 *
 * @param samples - 64 or more
 * @returns null for silence and for fewer samples
 */
export function estimateTone(
  samples: Float64Array,
  sampleRateHz: number,
  search: ToneSearch = {},
): ToneEstimate | null {
  const fftLength = Math.min(LONGEST_FFT, 2 ** Math.floor(Math.log2(samples.length)));
  if (fftLength < 64) return null;
  let sum = 0;
  for (let n = 0; n < samples.length; n++) sum += samples[n];
  const mean = sum / samples.length;
  const averager = createSpectrumAverager({
    sampleRateHz,
    fftLength,
    windowName: 'blackman-harris-4',
    overlap: 0.5,
  });
  averager.push(samples.map((value) => value - mean));
  // The constant part is gone, so that a few cycles of a low tone stand clear of bin 0.
  const lowHz = search.lowHz ?? (1.5 * sampleRateHz) / fftLength;
  return findStrongestTone(averager.finish(), { ...search, lowHz });
}
