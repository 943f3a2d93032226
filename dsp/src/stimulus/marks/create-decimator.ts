import { MARK_HIGH_HZ } from '../mark-chirp.js';
import { designLowPass } from './band-kernels.js';

/** Least rate that keeps the marks' band clear of what folds back. */
const LEAST_RATE_HZ = 16_000;

/** Lowers the rate of a stream, run by run. */
export interface Decimator {
  readonly sampleRateHz: number;
  /** Sample i of the output stands where sample i · factor of the input stood. */
  readonly factor: number;
  /** @param samples - the next run; not modified */
  push(samples: Float64Array): Float64Array;
  /** The samples that the stream's end still holds back. */
  flush(): Float64Array;
}

/** Makes a decimator to a rate of 16 kHz or a little more that keeps 0 to 6 kHz. */
export function createDecimator(sampleRateHz: number): Decimator {
  const factor = Math.max(1, Math.floor(sampleRateHz / LEAST_RATE_HZ));
  const lowRateHz = sampleRateHz / factor;
  const kernel =
    factor === 1 ? Float64Array.of(1) : designLowPass(MARK_HIGH_HZ, lowRateHz - MARK_HIGH_HZ, sampleRateHz);
  const half = (kernel.length - 1) / 2;
  // The input from the first sample that the next output needs; zeros stand before the stream.
  let held = new Float64Array(half);
  const push = (samples: Float64Array): Float64Array => {
    const input = new Float64Array(held.length + samples.length);
    input.set(held);
    input.set(samples, held.length);
    const count = Math.max(0, Math.floor((input.length - kernel.length) / factor) + 1);
    const output = new Float64Array(count);
    for (let i = 0; i < count; i++) {
      const from = i * factor;
      const to = from + kernel.length - 1;
      let sum = kernel[half] * input[from + half];
      let other = 0;
      let k = 0;
      // Two sums, so that neither addition waits for the other's.
      for (; k + 1 < half; k += 2) {
        sum += kernel[k] * (input[from + k] + input[to - k]);
        other += kernel[k + 1] * (input[from + k + 1] + input[to - k - 1]);
      }
      if (k < half) sum += kernel[k] * (input[from + k] + input[to - k]);
      output[i] = sum + other;
    }
    held = input.slice(count * factor);
    return output;
  };
  return { sampleRateHz: lowRateHz, factor, push, flush: () => push(new Float64Array(half)) };
}
