import { createRealFft } from '../../../spectrum/create-real-fft.js';
import { invertRealFft } from '../../../stimulus/marks/inverse-transform.js';
import { solveLinear } from '../../../tone/solve-linear.js';
import type { FrequencyResponse } from './frequency-response.js';

/** What a response's phase holds beyond the least that goes with its magnitude. */
export interface ExcessDelay {
  readonly delayS: number;
  /** Growth of the delay with the logarithm of frequency, seconds: what clocks that differ make of a sweep. */
  readonly perLogS: number;
}

export interface ExcessOptions {
  /** Band in which there is a response, Hz. */
  readonly lowHz: number;
  readonly highHz: number;
  readonly isInverted: boolean;
  /** Whether the growth is sought too; 0 without. */
  readonly seeksClock: boolean;
}

const FIT_LOW_HZ = 200;
/** Above this share of the band the least phase depends on what lies beyond it. */
const FIT_SHARE = 0.5;
const MIDDLE_HZ = 1000;
const SILENT = 1e-12;

/**
 * Tells pure delay from the phase that a filter has by its nature: the excess over the least phase of the magnitude is
 * fitted with a straight line, and with one in f ln f where the clock is sought.
 *
 * @see A. V. Oppenheim and R. W. Schafer, "Discrete-Time Signal Processing", chapter on Hilbert transform relations:
 *   least phase from the folded cepstrum
 */
export function fitExcessDelay(response: FrequencyResponse, options: ExcessOptions): ExcessDelay {
  const { re, im, binWidthHz } = response;
  const { lowHz, highHz, isInverted, seeksClock } = options;
  const sign = isInverted ? -1 : 1;
  const least = leastPhase(logMagnitudes(response, lowHz, highHz));
  const from = Math.max(1, Math.ceil(Math.max(lowHz, FIT_LOW_HZ) / binWidthHz));
  const to = Math.min(re.length - 1, Math.max(from + 2, Math.floor((FIT_SHARE * highHz) / binWidthHz)));
  const size = seeksClock ? 3 : 1;
  const matrix = Array.from({ length: size }, () => new Array<number>(size + 1).fill(0));
  let before = 0;
  for (let k = from; k <= to; k++) {
    const angle = Math.atan2(sign * im[k], sign * re[k]) - least[k];
    const excess = angle - 2 * Math.PI * Math.round((angle - before) / (2 * Math.PI));
    before = excess;
    const f = k * binWidthHz;
    const basis = seeksClock
      ? [-2 * Math.PI * f, -2 * Math.PI * f * (Math.log(f / MIDDLE_HZ) - 1), 1]
      : [-2 * Math.PI * f];
    // A sweep stays at low frequencies for longer: their phase is known better, as 1/f.
    for (let row = 0; row < size; row++) {
      for (let column = 0; column < size; column++) matrix[row][column] += (basis[row] * basis[column]) / f;
      matrix[row][size] += (basis[row] * excess) / f;
    }
  }
  const [delayS = 0, perLogS = 0] = solveLinear(matrix) ?? [];
  return { delayS, perLogS };
}

/** Logarithms of the magnitude; beyond the band it goes on with the slope it has there. */
function logMagnitudes(
  { re, im, binWidthHz }: FrequencyResponse,
  lowHz: number,
  highHz: number,
): Float64Array {
  const first = Math.max(1, Math.ceil(lowHz / binWidthHz));
  const last = Math.min(re.length - 1, Math.floor(highHz / binWidthHz));
  const log = re.map((value, k) => Math.log(Math.max(SILENT, Math.hypot(value, im[k]))));
  const slopeBetween = (one: number, other: number): number =>
    other > one ? (log[other] - log[one]) / Math.log(other / one) : 0;
  const highSlope = slopeBetween(Math.max(first, Math.round(last / 1.2)), last);
  const lowSlope = slopeBetween(first, Math.min(last, Math.round(first * 1.5)));
  for (let k = 0; k < first; k++) log[k] = log[first] + lowSlope * Math.log(Math.max(k, 0.5) / first);
  for (let k = last + 1; k < log.length; k++) log[k] = log[last] + highSlope * Math.log(k / last);
  return log;
}

/** Phase that a magnitude has at least, radians a bin. */
function leastPhase(logMagnitude: Float64Array): Float64Array {
  const half = logMagnitude.length - 1;
  const fft = createRealFft(2 * half);
  const im = new Float64Array(half + 1);
  const cepstrum = new Float64Array(2 * half);
  invertRealFft(fft, logMagnitude, im, cepstrum);
  for (let n = 1; n < half; n++) cepstrum[n] *= 2;
  cepstrum.fill(0, half + 1);
  const re = new Float64Array(half + 1);
  fft.transform(cepstrum, re, im);
  return im;
}
