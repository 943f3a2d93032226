const ROOT_HALF = Math.SQRT1_2;

/**
 * One radix-8 pass of `s` interleaved transforms of length 8·n1, from x to y.
 *
 * @param twiddles - cos and sin of W^p … W^7p, fourteen numbers for each p < n1
 * @param x - re and im in turn, as y
 */
export function passRadix8(
  n1: number,
  s: number,
  twiddles: Float64Array,
  x: Float64Array,
  y: Float64Array,
): void {
  const run = 2 * s;
  const eighth = n1 * run;
  for (let p = 0, t = 0, i = 0, o = 0; p < n1; p++, t += 14, o += 8 * run) {
    const c1 = twiddles[t];
    const s1 = twiddles[t + 1];
    const c2 = twiddles[t + 2];
    const s2 = twiddles[t + 3];
    const c3 = twiddles[t + 4];
    const s3 = twiddles[t + 5];
    const c4 = twiddles[t + 6];
    const s4 = twiddles[t + 7];
    const c5 = twiddles[t + 8];
    const s5 = twiddles[t + 9];
    const c6 = twiddles[t + 10];
    const s6 = twiddles[t + 11];
    const c7 = twiddles[t + 12];
    const s7 = twiddles[t + 13];
    const end = o + run;
    for (let q = o; q < end; q += 2, i += 2) {
      // Sums and differences of elements half a transform apart: the former make the even bins, the latter the odd ones.
      const i4 = i + 4 * eighth;
      const sum0r = x[i] + x[i4];
      const sum0i = x[i + 1] + x[i4 + 1];
      const dif0r = x[i] - x[i4];
      const dif0i = x[i + 1] - x[i4 + 1];
      const i2 = i + 2 * eighth;
      const i6 = i + 6 * eighth;
      const sum2r = x[i2] + x[i6];
      const sum2i = x[i2 + 1] + x[i6 + 1];
      const dif2r = x[i2] - x[i6];
      const dif2i = x[i2 + 1] - x[i6 + 1];
      const i1 = i + eighth;
      const i5 = i + 5 * eighth;
      const sum1r = x[i1] + x[i5];
      const sum1i = x[i1 + 1] + x[i5 + 1];
      const dif1r = x[i1] - x[i5];
      const dif1i = x[i1 + 1] - x[i5 + 1];
      const i3 = i + 3 * eighth;
      const i7 = i + 7 * eighth;
      const sum3r = x[i3] + x[i7];
      const sum3i = x[i3 + 1] + x[i7 + 1];
      const dif3r = x[i3] - x[i7];
      const dif3i = x[i3 + 1] - x[i7 + 1];

      const ar = sum0r + sum2r;
      const ai = sum0i + sum2i;
      const br = sum1r + sum3r;
      const bi = sum1i + sum3i;
      y[q] = ar + br;
      y[q + 1] = ai + bi;
      const bin4r = ar - br;
      const bin4i = ai - bi;
      y[q + 4 * run] = bin4r * c4 + bin4i * s4;
      y[q + 4 * run + 1] = bin4i * c4 - bin4r * s4;
      const cr = sum0r - sum2r;
      const ci = sum0i - sum2i;
      const dr = sum1i - sum3i;
      const di = sum3r - sum1r;
      const bin2r = cr + dr;
      const bin2i = ci + di;
      y[q + 2 * run] = bin2r * c2 + bin2i * s2;
      y[q + 2 * run + 1] = bin2i * c2 - bin2r * s2;
      const bin6r = cr - dr;
      const bin6i = ci - di;
      y[q + 6 * run] = bin6r * c6 + bin6i * s6;
      y[q + 6 * run + 1] = bin6i * c6 - bin6r * s6;

      // (dif1 ∓ dif3)/√2: the turns by an eighth and three eighths of a circle.
      const er = ROOT_HALF * (dif1r - dif3r);
      const ei = ROOT_HALF * (dif1i - dif3i);
      const fr = ROOT_HALF * (dif1r + dif3r);
      const fi = ROOT_HALF * (dif1i + dif3i);
      const gr = dif0r + er;
      const gi = dif0i + ei;
      const hr = dif2i + fi;
      const hi = dif2r + fr;
      const bin1r = gr + hr;
      const bin1i = gi - hi;
      y[q + run] = bin1r * c1 + bin1i * s1;
      y[q + run + 1] = bin1i * c1 - bin1r * s1;
      const bin7r = gr - hr;
      const bin7i = gi + hi;
      y[q + 7 * run] = bin7r * c7 + bin7i * s7;
      y[q + 7 * run + 1] = bin7i * c7 - bin7r * s7;
      const kr = dif0r - er;
      const ki = dif0i - ei;
      const lr = dif2i - fi;
      const li = dif2r - fr;
      const bin5r = kr + lr;
      const bin5i = ki - li;
      y[q + 5 * run] = bin5r * c5 + bin5i * s5;
      y[q + 5 * run + 1] = bin5i * c5 - bin5r * s5;
      const bin3r = kr - lr;
      const bin3i = ki + li;
      y[q + 3 * run] = bin3r * c3 + bin3i * s3;
      y[q + 3 * run + 1] = bin3i * c3 - bin3r * s3;
    }
  }
}
