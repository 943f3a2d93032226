import type { RealFft } from '../../spectrum/create-real-fft.js';

/**
 * Turns half a spectrum back into real samples with the forward transform alone, by way of the Hartley transform, which
 * is its own inverse: H[k] = Re X[k] - Im X[k].
 *
 * @param fft - a plan of length N
 * @param re - real parts, N/2 + 1 values, overwritten
 * @param im - imaginary parts, N/2 + 1 values, overwritten
 * @param samples - N values, written
 * @see R. N. Bracewell, "Discrete Hartley transform", J. Opt. Soc. Am. 73(12), 1983
 */
export function invertRealFft(fft: RealFft, re: Float64Array, im: Float64Array, samples: Float64Array): void {
  const { length } = fft;
  const half = length / 2;
  samples[0] = re[0];
  samples[half] = re[half];
  for (let k = 1; k < half; k++) {
    samples[k] = re[k] - im[k];
    samples[length - k] = re[k] + im[k];
  }
  fft.transform(samples, re, im);
  samples[0] = re[0] / length;
  samples[half] = re[half] / length;
  for (let n = 1; n < half; n++) {
    samples[n] = (re[n] - im[n]) / length;
    samples[length - n] = (re[n] + im[n]) / length;
  }
}
