import { createRealFft, type RealFft } from '../../spectrum/create-real-fft.js';

/** Turns a spectrum of real samples back into them, by a forward transform alone (through Hartley's kernel). */
function invert(fft: RealFft, re: Float64Array, im: Float64Array, samples: Float64Array): void {
  const { length } = fft;
  const half = length / 2;
  const hartley = new Float64Array(length);
  for (let k = 0; k <= half; k++) {
    hartley[k] = re[k] - im[k];
    if (k > 0 && k < half) hartley[length - k] = re[k] + im[k];
  }
  const backRe = new Float64Array(half + 1);
  const backIm = new Float64Array(half + 1);
  fft.transform(hartley, backRe, backIm);
  for (let n = 0; n <= half; n++) {
    samples[n] = (backRe[n] - backIm[n]) / length;
    if (n > 0 && n < half) samples[length - n] = (backRe[n] + backIm[n]) / length;
  }
}

/** Gives the symmetric kernel whose response is `gainAt` at the transform's bins: a zero-phase filter. */
function designKernel(fft: RealFft, gainAt: (bin: number) => number): Float64Array {
  const half = fft.length / 2;
  const re = Float64Array.from({ length: half + 1 }, (_, bin) => gainAt(bin));
  const kernel = new Float64Array(fft.length);
  invert(fft, re, new Float64Array(half + 1), kernel);
  return kernel;
}

/** The design's grid: its frequencies are 1.5 Hz apart at 48 kHz, 5.9 Hz at 192 kHz. */
const DESIGN_LENGTH = 32_768;
const RUN_LENGTH = 131_072;

/**
 * Filters without phase, by a kernel of 32,767 taps designed on a grid of frequencies and fast convolution (overlap-save).
 *
 * @param samples - not modified; silence is assumed beyond both ends
 * @param gainAt - linear gain wanted at a frequency, 0 to half the rate
 * @returns a new array of the same length
 * @see A. V. Oppenheim and R. W. Schafer, "Discrete-Time Signal Processing", 3rd edition, 8.7.3 (overlap-save)
 */
export function filterWithoutPhase(
  samples: Float64Array,
  sampleRateHz: number,
  gainAt: (frequencyHz: number) => number,
): Float64Array {
  const designFft = createRealFft(DESIGN_LENGTH);
  const kernel = designKernel(designFft, (bin) => gainAt((bin * sampleRateHz) / DESIGN_LENGTH));
  const reach = DESIGN_LENGTH / 2 - 1;
  const fft = createRealFft(RUN_LENGTH);
  const bins = RUN_LENGTH / 2 + 1;
  const padded = new Float64Array(RUN_LENGTH);
  for (let k = -reach; k <= reach; k++) {
    padded[(k + RUN_LENGTH) % RUN_LENGTH] = kernel[(k + DESIGN_LENGTH) % DESIGN_LENGTH];
  }
  // The kernel is symmetric about 0, so its spectrum is real.
  const response = new Float64Array(bins);
  fft.transform(padded, response, new Float64Array(bins));

  const result = new Float64Array(samples.length);
  const re = new Float64Array(bins);
  const im = new Float64Array(bins);
  const fresh = RUN_LENGTH - 2 * reach;
  for (let from = 0; from < samples.length; from += fresh) {
    const first = from - reach;
    padded.fill(0);
    padded.set(samples.subarray(Math.max(0, first), first + RUN_LENGTH), Math.max(0, -first));
    fft.transform(padded, re, im);
    for (let k = 0; k < bins; k++) {
      re[k] *= response[k];
      im[k] *= response[k];
    }
    invert(fft, re, im, padded);
    result.set(padded.subarray(reach, reach + Math.min(fresh, samples.length - from)), from);
  }
  return result;
}
