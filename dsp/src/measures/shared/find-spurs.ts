import { bandBins } from '../../spectrum/integrate-band.js';
import { medianOverMean } from '../../spectrum/local-density.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { peakOffset } from './find-line.js';

/** A line that nobody asked for. */
export interface Spur {
  readonly bin: number;
  readonly frequencyHz: number;
  /** Highest bin, FS². */
  readonly peak: number;
}

const BLOCK_BINS = 128;
/** Normal deviate that one bin in fifty million goes beyond: no spectrum has that many. */
const DEVIATE = 5.5;
const LEAST_THRESHOLD = 10;
export const SPURS_AT_MOST = 40;

/** How far above the mean noise a bin must stand to be a line: Wilson and Hilferty's cube root of chi-square. */
export function lineThreshold(effectiveAverages: number): number {
  const m = effectiveAverages;
  return Math.max(LEAST_THRESHOLD, (1 - 1 / (9 * m) + DEVIATE / (3 * Math.sqrt(m))) ** 3);
}

/**
 * Finds the lines that stand 10 dB or more above the noise around them, strongest first.
 *
 * The noise is the median of blocks of 128 bins, so that lines don't hide each other.
 *
 * @returns at most 40; of lines nearer than a lobe's half-width only the strongest
 */
export function findSpurs(
  spectrum: PowerSpectrum,
  band: { readonly lowHz: number; readonly highHz: number },
): Spur[] {
  const { power, binWidthHz, exclusionHalfWidthBins: half, effectiveAverages } = spectrum;
  const { first, last } = bandBins(spectrum, band.lowHz, band.highHz);
  const noise = blockNoise(power, effectiveAverages);
  const threshold = lineThreshold(effectiveAverages);
  const peaks: number[] = [];
  for (let k = Math.max(first, half + 1); k <= Math.min(last, power.length - 2); k++) {
    if (power[k] < power[k - 1] || power[k] < power[k + 1]) continue;
    const density = noise[Math.floor(k / BLOCK_BINS)];
    if (density > 0 && power[k] > threshold * density) peaks.push(k);
  }
  peaks.sort((one, other) => power[other] - power[one]);
  const kept: number[] = [];
  for (const k of peaks) {
    if (kept.length === SPURS_AT_MOST) break;
    if (kept.every((other) => Math.abs(other - k) > half)) kept.push(k);
  }
  return kept.map((k) => {
    const bin = k + peakOffset(power, k);
    return { bin, frequencyHz: bin * binWidthHz, peak: power[k] };
  });
}

/** Mean noise a bin of each block, from its median. */
function blockNoise(power: Float64Array, effectiveAverages: number): Float64Array {
  const blocks = Math.ceil(power.length / BLOCK_BINS);
  const correction = medianOverMean(Math.max(1, effectiveAverages));
  return Float64Array.from({ length: blocks }, (_, block) => {
    const from = Math.min(block * BLOCK_BINS, Math.max(0, power.length - BLOCK_BINS));
    const sorted = power.slice(from, from + BLOCK_BINS).sort();
    return sorted[sorted.length >> 1] / correction;
  });
}
