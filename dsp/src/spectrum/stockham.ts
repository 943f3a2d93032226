import { passRadix8 } from './pass-radix-8.js';

/** One pass and its twiddle factors: cos and sin of W^p … W^(radix-1)p for each p in turn. */
interface TwiddledPass {
  readonly radix: 4 | 8;
  readonly twiddles: Float64Array;
}

export interface StockhamPlan {
  readonly length: number;
  /** The passes before the last one, from the longest transform to the shortest. */
  readonly passes: readonly TwiddledPass[];
  /** The pass without twiddles that ends the transform. */
  readonly lastRadix: 1 | 2 | 4;
}

function createTwiddledPass(n: number, radix: 4 | 8): TwiddledPass {
  const row = 2 * (radix - 1);
  const twiddles = new Float64Array((n / radix) * row);
  for (let p = 0; p < n / radix; p++) {
    for (let m = 1; m < radix; m++) {
      const angle = (2 * Math.PI * ((m * p) % n)) / n;
      twiddles[row * p + 2 * (m - 1)] = Math.cos(angle);
      twiddles[row * p + 2 * (m - 1) + 1] = Math.sin(angle);
    }
  }
  return { radix, twiddles };
}

/**
 * Plans a complex transform of a power of two: in eights as long as what is left can end in fours, which asks for the
 * fewest passes over memory.
 *
 * @see C. Van Loan, "Computational Frameworks for the Fast Fourier Transform", SIAM 1992, 1.7: the Stockham autosort
 *   form, which needs no bit reversal and reads and writes in long runs
 */
export function createStockhamPlan(length: number): StockhamPlan {
  const passes: TwiddledPass[] = [];
  let n = length;
  while (n >= 8) {
    const radix = n === 16 ? 4 : 8;
    passes.push(createTwiddledPass(n, radix));
    n /= radix;
  }
  const lastRadix = n === 4 ? 4 : n === 2 ? 2 : 1;
  return { length, passes, lastRadix };
}

/** One radix-4 pass of `s` interleaved transforms of length 4·n1, from x to y, as `passRadix8`. */
function passRadix4(n1: number, s: number, twiddles: Float64Array, x: Float64Array, y: Float64Array): void {
  const run = 2 * s;
  const quarter = n1 * run;
  for (let p = 0, t = 0, i = 0, o = 0; p < n1; p++, t += 6, o += 4 * run) {
    const c1 = twiddles[t];
    const s1 = twiddles[t + 1];
    const c2 = twiddles[t + 2];
    const s2 = twiddles[t + 3];
    const c3 = twiddles[t + 4];
    const s3 = twiddles[t + 5];
    const end = o + run;
    for (let q = o; q < end; q += 2, i += 2) {
      const i1 = i + quarter;
      const i2 = i + 2 * quarter;
      const i3 = i + 3 * quarter;
      const acr = x[i] + x[i2];
      const aci = x[i + 1] + x[i2 + 1];
      const amr = x[i] - x[i2];
      const ami = x[i + 1] - x[i2 + 1];
      const bdr = x[i1] + x[i3];
      const bdi = x[i1 + 1] + x[i3 + 1];
      const bmr = x[i1] - x[i3];
      const bmi = x[i1 + 1] - x[i3 + 1];
      y[q] = acr + bdr;
      y[q + 1] = aci + bdi;
      const er = amr + bmi;
      const ei = ami - bmr;
      y[q + run] = er * c1 + ei * s1;
      y[q + run + 1] = ei * c1 - er * s1;
      const fr = acr - bdr;
      const fi = aci - bdi;
      y[q + 2 * run] = fr * c2 + fi * s2;
      y[q + 2 * run + 1] = fi * c2 - fr * s2;
      const gr = amr - bmi;
      const gi = ami + bmr;
      y[q + 3 * run] = gr * c3 + gi * s3;
      y[q + 3 * run + 1] = gi * c3 - gr * s3;
    }
  }
}

/** The last radix-4 pass, which has no twiddles. */
function lastPassRadix4(s: number, x: Float64Array, y: Float64Array): void {
  const run = 2 * s;
  for (let q = 0; q < run; q += 2) {
    const q1 = q + run;
    const q2 = q + 2 * run;
    const q3 = q + 3 * run;
    const acr = x[q] + x[q2];
    const aci = x[q + 1] + x[q2 + 1];
    const amr = x[q] - x[q2];
    const ami = x[q + 1] - x[q2 + 1];
    const bdr = x[q1] + x[q3];
    const bdi = x[q1 + 1] + x[q3 + 1];
    const bmr = x[q1] - x[q3];
    const bmi = x[q1 + 1] - x[q3 + 1];
    y[q] = acr + bdr;
    y[q + 1] = aci + bdi;
    y[q1] = amr + bmi;
    y[q1 + 1] = ami - bmr;
    y[q2] = acr - bdr;
    y[q2 + 1] = aci - bdi;
    y[q3] = amr - bmi;
    y[q3 + 1] = ami + bmr;
  }
}

function lastPassRadix2(s: number, x: Float64Array, y: Float64Array): void {
  const run = 2 * s;
  for (let q = 0; q < run; q++) {
    y[q] = x[q] + x[q + run];
    y[q + run] = x[q] - x[q + run];
  }
}

/**
 * Transforms N complex points.
 *
 * @param input - re and im in turn, 2N values, not modified; real samples so read are their own pairs
 * @param buffers - of 2N values each, overwritten
 * @returns the result, re and im in turn: one of the buffers, or the input itself for N = 1
 */
export function runPasses(
  plan: StockhamPlan,
  input: Float64Array,
  buffers: readonly [Float64Array, Float64Array],
): Float64Array {
  let from = input;
  let [to, other] = buffers;
  const turn = (): void => {
    from = to;
    [to, other] = [other, to];
  };
  let n = plan.length;
  let s = 1;
  for (const { radix, twiddles } of plan.passes) {
    n /= radix;
    if (radix === 8) passRadix8(n, s, twiddles, from, to);
    else passRadix4(n, s, twiddles, from, to);
    s *= radix;
    turn();
  }
  if (plan.lastRadix === 1) return from;
  if (plan.lastRadix === 4) lastPassRadix4(s, from, to);
  else lastPassRadix2(s, from, to);
  return to;
}
