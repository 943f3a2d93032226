/**
 * Finds the first NaN or ±Infinity.
 *
 * @param samples - any length; not modified
 * @returns its index, or -1 when every sample is finite
 */
export function findNonFinite(samples: Float64Array): number {
  // A finite sample times zero is zero; NaN and Infinity leave NaN in the sum. One test a block, not one a sample.
  let sum = 0;
  for (let n = 0; n < samples.length; n++) {
    sum += samples[n] * 0;
  }
  return sum === 0 ? -1 : samples.findIndex((sample) => !Number.isFinite(sample));
}
