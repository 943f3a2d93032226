import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';

/** A response read from noise: band means of its density against that around 1 kHz. */
export interface NoiseResponse {
  readonly x: Float64Array;
  /** dB. */
  readonly y: Float64Array;
  /** Standard uncertainty of each point, dB. */
  readonly deviationDb: Float64Array;
}

const POINTS_PER_OCTAVE = 48;
const BANDS_PER_OCTAVE = 24;
/** Bands are widened until their means are known to this, dB. */
const STABLE_DB = 0.1;
/** No band takes more than this of the range: a short recording shows its noise, and says so, rather than nothing at all. */
const WIDEST_SHARE = 1 / 16;
const DB_PER_RELATIVE_POWER = 10 / Math.LN10;
/** Third octave around 1 kHz. */
const REFERENCE_LOW_HZ = 891.25;
const REFERENCE_HIGH_HZ = 1122.02;
const FLOOR_DB = -400;

/** Mean power per bin between two frequencies, and its relative standard deviation. */
export function bandMean(
  spectrum: PowerSpectrum,
  lowHz: number,
  highHz: number,
): { mean: number; deviation: number } {
  const { power, binWidthHz, effectiveAverages, binCorrelation } = spectrum;
  const first = Math.max(1, Math.round(lowHz / binWidthHz));
  const last = Math.min(power.length - 1, Math.max(first, Math.round(highHz / binWidthHz)));
  let sum = 0;
  for (let k = first; k <= last; k++) sum += power[k];
  const count = Math.max(1, last - first + 1);
  const correlation = Math.min(count, binCorrelation);
  return { mean: sum / count, deviation: Math.sqrt(correlation / (count * effectiveAverages)) };
}

/**
 * Reads a response from the averaged spectrum of white noise.
 *
 * Each point is the power mean over a 24th of an octave, or over a wider band where noise would move that by more than
 * 0.1 dB; at the ends of the range the band keeps its width and moves inwards.
 *
 * @param spectrum - at least as high as highHz
 * @returns null where nothing lies around 1 kHz
 */
export function readNoiseResponse(
  spectrum: PowerSpectrum,
  lowHz: number,
  highHz: number,
): NoiseResponse | null {
  const reference = bandMean(spectrum, REFERENCE_LOW_HZ, REFERENCE_HIGH_HZ);
  if (!(reference.mean > 0)) return null;
  const relative = STABLE_DB / DB_PER_RELATIVE_POWER;
  const stableHz =
    (spectrum.binWidthHz * spectrum.binCorrelation) / (spectrum.effectiveAverages * relative * relative);
  const span = 2 ** (1 / (2 * BANDS_PER_OCTAVE)) - 2 ** (-1 / (2 * BANDS_PER_OCTAVE));
  const count = Math.max(2, 1 + Math.floor(POINTS_PER_OCTAVE * Math.log2(highHz / lowHz)));
  const x = Float64Array.from({ length: count }, (_, n) => lowHz * (highHz / lowHz) ** (n / (count - 1)));
  const deviationDb = new Float64Array(count);
  const y = x.map((hz, n) => {
    const width = Math.max(span * hz, Math.min(stableHz, WIDEST_SHARE * (highHz - lowHz)));
    const from = Math.min(highHz - width, Math.max(lowHz, hz - width / 2));
    const { mean, deviation } = bandMean(spectrum, from, from + width);
    deviationDb[n] = DB_PER_RELATIVE_POWER * Math.hypot(deviation, reference.deviation);
    return Math.max(FLOOR_DB, 10 * Math.log10(mean / reference.mean));
  });
  return { x, y, deviationDb };
}
