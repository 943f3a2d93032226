import { DspInputError } from '../errors.js';
import { WINDOW_COEFFICIENTS, type WindowName } from './window-coefficients.js';

export interface CosineWindow {
  readonly name: WindowName;
  readonly samples: Float64Array;
  /** Mean of the window. */
  readonly coherentGain: number;
  /** Mean of its square. */
  readonly powerGain: number;
  /** Noise bandwidth, bins. */
  readonly enbwBins: number;
  /** Bins from a tone's centre to the first null: what is nearer belongs to the tone. */
  readonly exclusionHalfWidthBins: number;
}

/** Gives the bins from a tone's centre to the first null, which for these windows is the number of cosine terms. */
export function exclusionHalfWidthBins(name: WindowName): number {
  return WINDOW_COEFFICIENTS[name].length;
}

/**
 * Makes a cosine-sum window in its periodic form (N in the denominator, so that its nulls fall on bins).
 *
 * @param name - one of `WINDOW_NAMES`
 * @param length - N ≥ 1 samples
 * @throws DspInputError `BAD_ARGUMENT` when the length isn't a positive whole number
 */
export function createWindow(name: WindowName, length: number): CosineWindow {
  if (!Number.isInteger(length) || length < 1) {
    throw new DspInputError('BAD_ARGUMENT', `a window can't be ${length} samples long`);
  }
  const samples = new Float64Array(length);
  const coefficients = WINDOW_COEFFICIENTS[name];
  const cosines = new Float64Array(length);
  for (let n = 0; n < length; n++) cosines[n] = Math.cos((2 * Math.PI * n) / length);
  let sum = 0;
  let sumOfSquares = 0;
  for (let n = 0; n < length; n++) {
    let value = 0;
    for (let k = 0, index = 0; k < coefficients.length; k++) {
      value += k % 2 === 0 ? coefficients[k] * cosines[index] : -coefficients[k] * cosines[index];
      index += n;
      if (index >= length) index -= length;
    }
    samples[n] = value;
    sum += value;
    sumOfSquares += value * value;
  }
  return {
    name,
    samples,
    coherentGain: sum / length,
    powerGain: sumOfSquares / length,
    enbwBins: (length * sumOfSquares) / (sum * sum),
    exclusionHalfWidthBins: coefficients.length,
  };
}
