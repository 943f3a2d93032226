import { localDensity } from '../../spectrum/local-density.js';

/** Power bins and the half-width of a line among them. */
export interface LineBins {
  readonly power: Float64Array;
  readonly exclusionHalfWidthBins: number;
  /** 1 for a single frame. */
  readonly effectiveAverages: number;
}

/** A line's highest bin and how far it stands out. */
export interface FoundLine {
  /** Place in bins, from the parabola through the logarithms of three bins. */
  readonly bin: number;
  /** Highest bin's power against the noise a bin around it. */
  readonly prominence: number;
}

/**
 * Finds the strongest line between two bins.
 *
 * @param power - a power spectrum, averaged or of one frame, any scale; not modified
 * @returns null when the range holds no bin above zero
 * @see Spectral peak interpolation by a parabola in dB: error below 0.001 bin with the seven-term window
 */
export function findStrongestLine(spectrum: LineBins, fromBin: number, toBin: number): FoundLine | null {
  const { power } = spectrum;
  const first = Math.max(1, Math.ceil(fromBin));
  const last = Math.min(power.length - 2, Math.floor(toBin));
  let best = -1;
  for (let k = first; k <= last; k++) {
    if (best < 0 || power[k] > power[best]) best = k;
  }
  if (best < 0 || power[best] <= 0) return null;
  return { bin: best + peakOffset(power, best), prominence: prominenceAt(spectrum, best) };
}

/** Where between its neighbours a peak's top lies, bins, -0.5 to 0.5. */
export function peakOffset(power: Float64Array, bin: number): number {
  const [left, middle, right] = [bin - 1, bin, bin + 1].map((k) =>
    Math.log(Math.max(power[k], Number.MIN_VALUE)),
  );
  const curvature = left - 2 * middle + right;
  if (!(curvature < 0)) return 0;
  return Math.min(0.5, Math.max(-0.5, (0.5 * (left - right)) / curvature));
}

/** How far a bin stands out of the noise around it, as a power ratio. */
export function prominenceAt(spectrum: LineBins, bin: number): number {
  const { power, exclusionHalfWidthBins: half, effectiveAverages } = spectrum;
  const first = Math.max(0, bin - half);
  const last = Math.min(power.length - 1, bin + half);
  const isTaken = new Uint8Array(power.length);
  isTaken.fill(1, 0, half + 1); // the constant's surroundings
  isTaken.fill(1, first, last + 1);
  const { perBin } = localDensity(power, isTaken, first, last, half, effectiveAverages);
  return perBin > 0 ? power[bin] / perBin : Number.MAX_VALUE;
}
