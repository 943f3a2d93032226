import { DspInputError } from '../errors.js';
import { createWindow } from '../window/create-window.js';
import type { WindowName } from '../window/window-coefficients.js';
import { searchNear } from './search-near.js';
import { solveLinear } from './solve-linear.js';

export interface SineFit {
  readonly frequencyHz: number;
  /** Peak, FS, ≥ 0. */
  readonly amplitude: number;
  /** Phase φ of amplitude · sin(2πft + φ) at the first sample, in (-π, π]. */
  readonly phaseRad: number;
  /** Constant part, FS. */
  readonly offset: number;
  /** Steps of the frequency; 0 when it was held. */
  readonly iterations: number;
}

export interface SineFitOptions {
  /** Hold the frequency at the start value (three parameters). */
  readonly holdFrequency?: boolean;
  /** Weight of the squares; by default the narrowest that keeps harmonics out, by the number of cycles. */
  readonly windowName?: WindowName;
  /** How far from the start the frequency may lie, in units of 1/duration; 2 by default. */
  readonly searchBins?: number;
}

const MOST_ITERATIONS = 30;
/** A step this small, in cycles over the record, changes nothing that a double can hold. */
const CONVERGED_CYCLES = 1e-13;
const RENEW_EVERY = 32;

/** Keeps harmonics, whole multiples of `cycles` bins away, beyond the window's main lobe. */
function windowFor(cycles: number): WindowName {
  if (cycles >= 8) return 'blackman-harris-7';
  if (cycles >= 4.5) return 'blackman-harris-4';
  return cycles >= 2.5 ? 'hann' : 'rectangular';
}

interface Step {
  readonly a: number;
  readonly b: number;
  readonly offset: number;
  /** Change of the phase growth over half the record, rad. */
  readonly slope: number;
}

/**
 * One least-squares step about a frequency: columns cos, sin, 1 and, when the frequency is free, the derivative
 * u·(-a sin + b cos) with u from -1 to 1 over the record.
 */
function solveStep(
  samples: Float64Array,
  weights: Float64Array,
  radPerSample: number,
  about: Step,
  isFree: boolean,
): Step | null {
  const length = samples.length;
  const centre = (length - 1) / 2;
  const scale = length / 2;
  const stepCos = Math.cos(radPerSample);
  const stepSin = Math.sin(radPerSample);
  let cc = 0,
    cs = 0,
    ss = 0,
    c1 = 0,
    s1 = 0,
    w1 = 0,
    cd = 0,
    sd = 0,
    d1 = 0,
    dd = 0;
  let cx = 0,
    sx = 0,
    x1 = 0,
    dx = 0;
  let c = 1;
  let s = 0;
  for (let n = 0; n < length; n++) {
    if (n % RENEW_EVERY === 0) {
      const phase = radPerSample * (n - centre);
      c = Math.cos(phase);
      s = Math.sin(phase);
    }
    const weight = weights[n];
    const x = samples[n];
    const wc = weight * c;
    const ws = weight * s;
    cc += wc * c;
    cs += wc * s;
    ss += ws * s;
    c1 += wc;
    s1 += ws;
    w1 += weight;
    cx += wc * x;
    sx += ws * x;
    x1 += weight * x;
    const d = ((n - centre) / scale) * (about.b * c - about.a * s);
    cd += wc * d;
    sd += ws * d;
    const wd = weight * d;
    d1 += wd;
    dd += wd * d;
    dx += wd * x;
    const next = c * stepCos - s * stepSin;
    s = s * stepCos + c * stepSin;
    c = next;
  }
  const matrix = isFree
    ? [
        [cc, cs, c1, cd, cx],
        [cs, ss, s1, sd, sx],
        [c1, s1, w1, d1, x1],
        [cd, sd, d1, dd, dx],
      ]
    : [
        [cc, cs, c1, cx],
        [cs, ss, s1, sx],
        [c1, s1, w1, x1],
      ];
  const solution = solveLinear(matrix);
  if (!solution?.every(Number.isFinite)) return null;
  return { a: solution[0], b: solution[1], offset: solution[2], slope: isFree ? solution[3] : 0 };
}

/**
 * Fits amplitude · sin(2πft + φ) + offset to samples by weighted least squares: three parameters when the frequency is
 * held, else four. The index is centred on the record and the frequency's column scaled, so that the equations are well
 * conditioned; the squares are weighted with a window, so that harmonics don't pull the fit.
 *
 * @param samples - one channel, FS, not modified; holds at least one cycle
 * @param startFrequencyHz - a start within `searchBins` of the tone
 * @throws DspInputError `SEGMENT_TOO_SHORT` below eight samples or one cycle; `BAD_ARGUMENT` when the start isn't between
 *   0 and half the sample rate; `NOTHING_MEASURABLE` when the samples hold no tone there (silence)
 * @see IEEE Std 1057-2017, 4.6: three- and four-parameter sine fits (clause from memory)
 */
export function fitSine(
  samples: Float64Array,
  sampleRateHz: number,
  startFrequencyHz: number,
  options: SineFitOptions = {},
): SineFit {
  const length = samples.length;
  if (!(startFrequencyHz > 0 && startFrequencyHz < sampleRateHz / 2)) {
    throw new DspInputError(
      'BAD_ARGUMENT',
      `${startFrequencyHz} Hz isn't between 0 and half the sample rate`,
    );
  }
  const cycles = (startFrequencyHz * length) / sampleRateHz;
  if (length < 8 || cycles < 1) {
    throw new DspInputError(
      'SEGMENT_TOO_SHORT',
      `${length} samples don't hold a cycle of ${startFrequencyHz} Hz`,
    );
  }
  const weights = createWindow(options.windowName ?? windowFor(cycles), length).samples;
  const isFree = options.holdFrequency !== true;
  const startRad = (2 * Math.PI * startFrequencyHz) / sampleRateHz;
  let radPerSample = isFree ? searchNear(samples, weights, startRad, options.searchBins ?? 2) : startRad;

  let step = solveStep(samples, weights, radPerSample, { a: 0, b: 0, offset: 0, slope: 0 }, false);
  let iterations = 0;
  let lastCycles = Infinity;
  while (isFree && step !== null && Math.hypot(step.a, step.b) > 0 && iterations < MOST_ITERATIONS) {
    const next: Step | null = solveStep(samples, weights, radPerSample, step, true);
    if (next === null) break;
    step = next;
    iterations++;
    const stepCycles = Math.abs(next.slope) / Math.PI;
    // Rounding keeps the steps from shrinking further.
    if (stepCycles >= lastCycles && stepCycles < 1e-9) break;
    radPerSample += next.slope / (length / 2);
    lastCycles = stepCycles;
    if (stepCycles < CONVERGED_CYCLES) break;
  }
  if (step === null || !(Math.hypot(step.a, step.b) > 0) || !(radPerSample > 0 && radPerSample < Math.PI)) {
    throw new DspInputError('NOTHING_MEASURABLE', `there is no tone near ${startFrequencyHz} Hz`);
  }
  // a cos θ + b sin θ = amplitude · sin(θ + atan2(a, b)), θ counted from the middle.
  const phase = Math.atan2(step.a, step.b) - radPerSample * ((length - 1) / 2);
  return {
    frequencyHz: (radPerSample * sampleRateHz) / (2 * Math.PI),
    amplitude: Math.hypot(step.a, step.b),
    phaseRad: Math.atan2(Math.sin(phase), Math.cos(phase)),
    offset: step.offset,
    iterations,
  };
}
