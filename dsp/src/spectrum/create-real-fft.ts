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

/**
 * Turns the transform of the packed sequence (even samples real, odd ones imaginary) into that of the real one.
 *
 * @param packed - half = N/2 points, re and im in turn
 */
function unpack(
  half: number,
  cos: Float64Array,
  sin: Float64Array,
  packed: Float64Array,
  re: Float64Array,
  im: Float64Array,
): void {
  re[0] = packed[0] + packed[1];
  re[half] = packed[0] - packed[1];
  im[0] = 0;
  im[half] = 0;
  for (let k = 1, m = half - 1; k <= m; k++, m--) {
    const kr = packed[2 * k];
    const ki = packed[2 * k + 1];
    const mr = packed[2 * m];
    const mi = packed[2 * m + 1];
    const evenRe = 0.5 * (kr + mr);
    const evenIm = 0.5 * (ki - mi);
    const oddRe = 0.5 * (ki + mi);
    const oddIm = 0.5 * (mr - kr);
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
  const plan = createStockhamPlan(half);
  const buffers = [new Float64Array(length), new Float64Array(length)] as const;
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
      unpack(half, cos, sin, runPasses(plan, samples, buffers), re, im);
    },
  };
}
