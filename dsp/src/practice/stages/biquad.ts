/** Coefficients over a0: y = b0 x + b1 x' + b2 x'' - a1 y' - a2 y''. */
export interface Biquad {
  readonly b0: number;
  readonly b1: number;
  readonly b2: number;
  readonly a1: number;
  readonly a2: number;
}

/** Makes a runner of a section in the transposed second direct form: in place, block by block, its state kept. */
export function createBiquad({ b0, b1, b2, a1, a2 }: Biquad): (samples: Float64Array) => void {
  let s1 = 0;
  let s2 = 0;
  return (samples) => {
    for (let n = 0; n < samples.length; n++) {
      const x = samples[n];
      const y = b0 * x + s1;
      s1 = b1 * x - a1 * y + s2;
      s2 = b2 * x - a2 * y;
      samples[n] = y;
    }
  };
}
