import type { CosineWindow } from '../window/create-window.js';

/** Correlation of the powers of two segments of white noise, `shift` samples apart. */
function segmentCorrelation(window: CosineWindow, shift: number): number {
  const { samples, powerGain } = window;
  let sum = 0;
  for (let n = shift; n < samples.length; n++) sum += samples[n] * samples[n - shift];
  return (sum / (samples.length * powerGain)) ** 2;
}

/**
 * Gives what averaged, overlapping segments are worth in independent ones, and how neighbouring bins hang together.
 *
 * @param averages - segments averaged, ≥ 1
 * @param hop - samples from one segment to the next
 * @param lastShift - samples from the last but one to the last
 * @see P. D. Welch 1967 (as in `createSpectrumAverager`): the variance of the averaged power of white noise
 */
export function countEffectiveAverages(
  window: CosineWindow,
  averages: number,
  hop: number,
  lastShift: number,
): { readonly effectiveAverages: number; readonly binCorrelation: number } {
  const length = window.samples.length;
  let sumOfFourths = 0;
  for (let n = 0; n < length; n++) sumOfFourths += window.samples[n] ** 4;
  const binCorrelation = sumOfFourths / length / window.powerGain ** 2;

  // Var = Σij ρij / M²; the regular segments first, then those pairs that the last one makes.
  const regular = lastShift === hop ? averages : averages - 1;
  let covariance = averages;
  for (let lag = 1; lag < regular && lag * hop < length; lag++) {
    covariance += 2 * (regular - lag) * segmentCorrelation(window, lag * hop);
  }
  if (regular < averages) {
    for (let before = 0; before < regular; before++) {
      const shift = lastShift + before * hop;
      if (shift >= length) break;
      covariance += 2 * segmentCorrelation(window, shift);
    }
  }
  return { effectiveAverages: (averages * averages) / covariance, binCorrelation };
}
