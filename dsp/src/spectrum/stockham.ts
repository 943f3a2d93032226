/** Twiddle factors of one radix-4 pass: cos and sin of W^p, W^2p and W^3p, six numbers for each p. */
type PassTwiddles = Float64Array;

export interface StockhamPlan {
  readonly length: number;
  /** Radix-4 passes before the last one, from the longest transform to the shortest. */
  readonly passes: readonly PassTwiddles[];
  /** The pass without twiddles that ends the transform. */
  readonly lastRadix: 1 | 2 | 4;
  /** Passes in all: their parity says in which buffer the result stands. */
  readonly passCount: number;
}

function createPassTwiddles(n: number): PassTwiddles {
  const twiddles = new Float64Array((n / 4) * 6);
  for (let p = 0; p < n / 4; p++) {
    for (let m = 1; m <= 3; m++) {
      const angle = (2 * Math.PI * ((m * p) % n)) / n;
      twiddles[6 * p + 2 * (m - 1)] = Math.cos(angle);
      twiddles[6 * p + 2 * (m - 1) + 1] = Math.sin(angle);
    }
  }
  return twiddles;
}

/**
 * Plans a complex transform of a power of two.
 *
 * @see C. Van Loan, "Computational Frameworks for the Fast Fourier Transform", SIAM 1992, 1.7: the Stockham autosort
 *   form, which needs no bit reversal and reads and writes in long runs
 */
export function createStockhamPlan(length: number): StockhamPlan {
  const passes: PassTwiddles[] = [];
  let n = length;
  for (; n > 4; n /= 4) passes.push(createPassTwiddles(n));
  const lastRadix = n === 4 ? 4 : n === 2 ? 2 : 1;
  return { length, passes, lastRadix, passCount: passes.length + (lastRadix === 1 ? 0 : 1) };
}

/** One radix-4 pass of `s` interleaved transforms of length n = 4·n1, from x to y. */
export function passRadix4(
  n1: number,
  s: number,
  twiddles: PassTwiddles,
  xr: Float64Array,
  xi: Float64Array,
  yr: Float64Array,
  yi: Float64Array,
): void {
  const quarter = n1 * s;
  for (let p = 0, t = 0, i = 0, o = 0; p < n1; p++, t += 6, o += 4 * s) {
    const c1 = twiddles[t];
    const s1 = twiddles[t + 1];
    const c2 = twiddles[t + 2];
    const s2 = twiddles[t + 3];
    const c3 = twiddles[t + 4];
    const s3 = twiddles[t + 5];
    const end = o + s;
    for (let q = o; q < end; q++, i++) {
      const ar = xr[i];
      const ai = xi[i];
      const br = xr[i + quarter];
      const bi = xi[i + quarter];
      const cr = xr[i + 2 * quarter];
      const ci = xi[i + 2 * quarter];
      const dr = xr[i + 3 * quarter];
      const di = xi[i + 3 * quarter];
      const acr = ar + cr;
      const aci = ai + ci;
      const amr = ar - cr;
      const ami = ai - ci;
      const bdr = br + dr;
      const bdi = bi + di;
      const bmr = br - dr;
      const bmi = bi - di;
      yr[q] = acr + bdr;
      yi[q] = aci + bdi;
      const er = amr + bmi;
      const ei = ami - bmr;
      yr[q + s] = er * c1 + ei * s1;
      yi[q + s] = ei * c1 - er * s1;
      const fr = acr - bdr;
      const fi = aci - bdi;
      yr[q + 2 * s] = fr * c2 + fi * s2;
      yi[q + 2 * s] = fi * c2 - fr * s2;
      const gr = amr - bmi;
      const gi = ami + bmr;
      yr[q + 3 * s] = gr * c3 + gi * s3;
      yi[q + 3 * s] = gi * c3 - gr * s3;
    }
  }
}

/** The last radix-4 pass, which has no twiddles. */
function lastPassRadix4(
  s: number,
  xr: Float64Array,
  xi: Float64Array,
  yr: Float64Array,
  yi: Float64Array,
): void {
  for (let q = 0; q < s; q++) {
    const acr = xr[q] + xr[q + 2 * s];
    const aci = xi[q] + xi[q + 2 * s];
    const amr = xr[q] - xr[q + 2 * s];
    const ami = xi[q] - xi[q + 2 * s];
    const bdr = xr[q + s] + xr[q + 3 * s];
    const bdi = xi[q + s] + xi[q + 3 * s];
    const bmr = xr[q + s] - xr[q + 3 * s];
    const bmi = xi[q + s] - xi[q + 3 * s];
    yr[q] = acr + bdr;
    yi[q] = aci + bdi;
    yr[q + s] = amr + bmi;
    yi[q + s] = ami - bmr;
    yr[q + 2 * s] = acr - bdr;
    yi[q + 2 * s] = aci - bdi;
    yr[q + 3 * s] = amr - bmi;
    yi[q + 3 * s] = ami + bmr;
  }
}

function lastPassRadix2(
  s: number,
  xr: Float64Array,
  xi: Float64Array,
  yr: Float64Array,
  yi: Float64Array,
): void {
  for (let q = 0; q < s; q++) {
    const ar = xr[q];
    const ai = xi[q];
    const br = xr[q + s];
    const bi = xi[q + s];
    yr[q] = ar + br;
    yi[q] = ai + bi;
    yr[q + s] = ar - br;
    yi[q + s] = ai - bi;
  }
}

/**
 * Runs the passes of `batch` interleaved transforms (element n of transform b stands at n·batch + b), from pass
 * `firstPass` on.
 *
 * @param x - input, overwritten
 * @param y - the other buffer; the result stands in y when the passes run are odd in number, else in x
 */
export function runPasses(
  plan: StockhamPlan,
  batch: number,
  firstPass: number,
  xr: Float64Array,
  xi: Float64Array,
  yr: Float64Array,
  yi: Float64Array,
): void {
  let fromRe = xr;
  let fromIm = xi;
  let toRe = yr;
  let toIm = yi;
  let n = plan.length;
  let s = batch;
  for (let pass = 0; pass < plan.passes.length; pass++) {
    if (pass >= firstPass) {
      passRadix4(n / 4, s, plan.passes[pass], fromRe, fromIm, toRe, toIm);
      [fromRe, toRe] = [toRe, fromRe];
      [fromIm, toIm] = [toIm, fromIm];
    }
    n /= 4;
    s *= 4;
  }
  if (plan.lastRadix === 4) lastPassRadix4(s, fromRe, fromIm, toRe, toIm);
  if (plan.lastRadix === 2) lastPassRadix2(s, fromRe, fromIm, toRe, toIm);
}
