import { DspInputError } from '../errors.js';
import { createStockhamPlan, runPasses } from './stockham.js';

/** A plan for transforms of one length; kept by its caller, used by one at a time. */
export interface RealFft {
  /** N, samples. */
  readonly length: number;
  /**
   * Transforms real samples: X[k] = Σ x[n] exp(-2πikn/N), without scaling.
   *
   * @param samples - N values, not modified
   * @param re - N/2 + 1 values, written
   * @param im - N/2 + 1 values, written
   */
  transform(samples: Float64Array, re: Float64Array, im: Float64Array): void;
}

/** Transforms the complex sequence that real samples make in pairs: even ones real, odd ones imaginary. */
type PackedTransform = (samples: Float64Array, re: Float64Array, im: Float64Array) => void;

/** Plans it for `length` complex points; works between the output and one buffer of its own. */
function createPackedTransform(length: number): PackedTransform {
  const plan = createStockhamPlan(length);
  const bufferRe = new Float64Array(length);
  const bufferIm = new Float64Array(length);
  const isEven = plan.passCount % 2 === 0;
  return (samples, re, im) => {
    const firstRe = isEven ? re : bufferRe;
    const firstIm = isEven ? im : bufferIm;
    for (let n = 0; n < length; n++) {
      firstRe[n] = samples[2 * n];
      firstIm[n] = samples[2 * n + 1];
    }
    runPasses(plan, 1, 0, firstRe, firstIm, isEven ? bufferRe : re, isEven ? bufferIm : im);
  };
}

/** Turns the transform of the packed sequence, half = N/2 points, into that of the real one, in place. */
function unpack(
  half: number,
  cos: Float64Array,
  sin: Float64Array,
  re: Float64Array,
  im: Float64Array,
): void {
  const re0 = re[0];
  re[0] = re0 + im[0];
  re[half] = re0 - im[0];
  im[0] = 0;
  im[half] = 0;
  for (let k = 1, m = half - 1; k <= m; k++, m--) {
    const evenRe = 0.5 * (re[k] + re[m]);
    const evenIm = 0.5 * (im[k] - im[m]);
    const oddRe = 0.5 * (im[k] + im[m]);
    const oddIm = 0.5 * (re[m] - re[k]);
    const turnedRe = oddRe * cos[k] + oddIm * sin[k];
    const turnedIm = oddIm * cos[k] - oddRe * sin[k];
    re[k] = evenRe + turnedRe;
    im[k] = evenIm + turnedIm;
    re[m] = evenRe - turnedRe;
    im[m] = turnedIm - evenIm;
  }
}

/**
 * Plans the transform of N real samples: N/2 complex points and one pass that takes them apart.
 *
 * @param length - N, a power of two, 2 or more
 * @throws DspInputError `BAD_ARGUMENT` for any other length
 */
export function createRealFft(length: number): RealFft {
  if (!Number.isInteger(Math.log2(length)) || length < 2) {
    throw new DspInputError(
      'BAD_ARGUMENT',
      `a transform can't be ${length} samples long: give a power of two`,
    );
  }
  const half = length / 2;
  const transformPacked = createPackedTransform(half);
  const cos = new Float64Array((half >> 1) + 1);
  const sin = new Float64Array((half >> 1) + 1);
  for (let k = 0; k < cos.length; k++) {
    cos[k] = Math.cos((2 * Math.PI * k) / length);
    sin[k] = Math.sin((2 * Math.PI * k) / length);
  }
  return {
    length,
    transform(samples, re, im) {
      if (samples.length !== length || re.length <= half || im.length <= half) {
        throw new DspInputError(
          'BAD_ARGUMENT',
          `the transform takes ${length} samples and gives ${half + 1} bins`,
        );
      }
      transformPacked(samples, re, im);
      unpack(half, cos, sin, re, im);
    },
  };
}
