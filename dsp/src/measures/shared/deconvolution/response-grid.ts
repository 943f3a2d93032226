import { powerToDb } from '../../../level/decibel.js';
import type { FrequencyResponse } from './frequency-response.js';

/** Beyond the frequency at which bins lie closer than this, a curve is drawn at so many points an octave. */
const POINTS_PER_OCTAVE = 192;

/** Bins of a curve over a band: every bin where they are sparse, evenly in octaves above. */
export function gridBins(binWidthHz: number, lowHz: number, highHz: number): number[] {
  const bins: number[] = [];
  const last = Math.floor(highHz / binWidthHz);
  const factor = 2 ** (1 / POINTS_PER_OCTAVE);
  for (
    let k = Math.max(1, Math.ceil(lowHz / binWidthHz));
    k <= last;
    k = Math.max(k + 1, Math.round(k * factor))
  ) {
    bins.push(k);
  }
  return bins;
}

/** dB of a response's bins. */
export function levelsDb({ re, im }: FrequencyResponse): Float64Array {
  return re.map((x, k) => powerToDb(Math.max(x * x + im[k] * im[k], Number.MIN_VALUE)));
}
