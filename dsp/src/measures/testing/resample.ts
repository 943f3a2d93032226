import { createRealFft } from '../../spectrum/create-real-fft.js';

/**
 * Takes samples to another rate by their spectrum: what a recorder hears of a player with ideal filters.
 *
 * Works on blocks whose lengths stand as the rates do, by the definition of the transform of a band-limited series: the
 * sum over its own lines, evaluated with a transform of a common power of two for the input alone.
 */
export function resampleByFft(samples: Float64Array, fromHz: number, toHz: number): Float64Array {
  const length = 2 ** Math.ceil(Math.log2(samples.length));
  const re = new Float64Array(length / 2 + 1);
  const im = new Float64Array(length / 2 + 1);
  const padded = new Float64Array(length);
  padded.set(samples);
  // Oversampled eight times by zeros in the spectrum, then read between by a cubic: -130 dB and better below 0.45 of the rate.
  const factor = 8;
  createRealFft(length).transform(padded, re, im);
  const fine = new Float64Array(length * factor);
  const fineRe = new Float64Array((length * factor) / 2 + 1);
  const fineIm = new Float64Array((length * factor) / 2 + 1);
  const end = Math.floor((length / 2) * Math.min(1, (0.995 * toHz) / fromHz));
  fineRe.set(re.subarray(0, end));
  fineIm.set(im.subarray(0, end));
  invert(fineRe, fineIm, fine);
  const count = Math.floor((samples.length * toHz) / fromHz);
  return Float64Array.from({ length: count }, (_, n) => factor * cubicAt(fine, (n * fromHz * factor) / toHz));
}

function invert(re: Float64Array, im: Float64Array, out: Float64Array): void {
  const n = out.length;
  const half = n / 2;
  for (let k = 0; k <= half; k++) {
    out[k] = re[k] - im[k];
    if (k > 0 && k < half) out[n - k] = re[k] + im[k];
  }
  const tre = new Float64Array(half + 1);
  const tim = new Float64Array(half + 1);
  createRealFft(n).transform(out, tre, tim);
  for (let k = 0; k <= half; k++) {
    out[k] = (tre[k] - tim[k]) / n;
    if (k > 0 && k < half) out[n - k] = (tre[k] + tim[k]) / n;
  }
}

/** Six-point Lagrange. */
function cubicAt(x: Float64Array, place: number): number {
  const k = Math.floor(place);
  const t = place - k;
  let sum = 0;
  for (let i = -2; i <= 3; i++) {
    let weight = 1;
    for (let j = -2; j <= 3; j++) if (j !== i) weight *= (t - j) / (i - j);
    sum += weight * (x[k + i] ?? 0);
  }
  return sum;
}
