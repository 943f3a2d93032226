import { createRealFft } from '../../spectrum/create-real-fft.js';
import { MARK_DURATION_S, MARK_LOW_HZ, markAt, quadratureMarkAt } from '../mark-chirp.js';
import { designHighPass } from './band-kernels.js';
import { invertRealFft } from './inverse-transform.js';

/** A place where the signal looks like a mark. */
export interface MarkCandidate {
  /** Seconds from the stream's first sample to the mark's beginning, to a sample of the lowered rate. */
  readonly atS: number;
  /** Peak of the mark, linear. */
  readonly amplitude: number;
  /** Normalised correlation with a mark, 0 to 1. */
  readonly likeness: number;
}

export interface CandidateFinder {
  /** @param samples - the next run of the lowered rate; not modified */
  push(samples: Float64Array): void;
  /** Ends the stream and gives the likeliest places in order of time. */
  finish(): MarkCandidate[];
}

const FFT_LENGTH = 16_384;
/**
 * Noise of the marks' band reaches it once in e^(0.16 · 240) tries: 240 is a mark's product of duration and bandwidth.
 * A mark reaches it down to 7 dB of noise in its band above itself.
 */
const LEAST_LIKENESS = 0.4;
/** Maxima closer than this belong to one mark. */
const APART_S = 0.03;
const MOST_CANDIDATES = 400;
/** Hum and the lead-in lie below, and may be stronger than the marks. */
const HIGH_PASS_FROM_HZ = 1000;
/** Energy, against the block's, below which only the transform's rounding is left. */
const ROUNDING = 1e-13;

interface Kernels {
  readonly markLength: number;
  readonly half: number;
  readonly energy: number;
  readonly highPass: Float64Array;
  readonly inPhase: readonly [Float64Array, Float64Array];
  readonly quadrature: readonly [Float64Array, Float64Array];
}

function designKernels(sampleRateHz: number): Kernels {
  const fft = createRealFft(FFT_LENGTH);
  const transform = (samples: Float64Array): [Float64Array, Float64Array] => {
    const re = new Float64Array(FFT_LENGTH / 2 + 1);
    const im = new Float64Array(FFT_LENGTH / 2 + 1);
    fft.transform(samples, re, im);
    return [re, im];
  };
  const padded = (of: (n: number) => number, length: number): Float64Array =>
    Float64Array.from({ length: FFT_LENGTH }, (_, n) => (n < length ? of(n) : 0));
  const markLength = Math.ceil(MARK_DURATION_S * sampleRateHz);
  const mark = padded((n) => markAt(n / sampleRateHz), markLength);
  const kernel = designHighPass(HIGH_PASS_FROM_HZ, MARK_LOW_HZ, sampleRateHz);
  const half = (kernel.length - 1) / 2;
  const centred = new Float64Array(FFT_LENGTH);
  kernel.forEach((tap, k) => (centred[(k - half + FFT_LENGTH) % FFT_LENGTH] = tap));
  return {
    markLength,
    half,
    energy: mark.reduce((sum, x) => sum + x * x, 0),
    highPass: transform(centred)[0],
    inPhase: transform(mark),
    quadrature: transform(padded((n) => quadratureMarkAt(n / sampleRateHz), markLength)),
  };
}

function correlate(
  re: Float64Array,
  im: Float64Array,
  [markRe, markIm]: readonly [Float64Array, Float64Array],
  productRe: Float64Array,
  productIm: Float64Array,
): void {
  for (let k = 0; k < re.length; k++) {
    productRe[k] = re[k] * markRe[k] + im[k] * markIm[k];
    productIm[k] = im[k] * markRe[k] - re[k] * markIm[k];
  }
}

/**
 * Makes a finder of marks: a matched filter by overlapping transforms, in phase and in quadrature, so that gain, polarity
 * and phase of the chain don't matter, held against the energy of what it looks at. Memory doesn't grow with the stream.
 *
 * @see A. V. Oppenheim and R. W. Schafer, Discrete-Time Signal Processing, block convolution (section from memory)
 */
export function createCandidateFinder(sampleRateHz: number): CandidateFinder {
  const kernels = designKernels(sampleRateHz);
  const { markLength, half, energy } = kernels;
  const fft = createRealFft(FFT_LENGTH);
  const stepFrames = FFT_LENGTH - markLength - 2 * half;
  const bins = FFT_LENGTH / 2 + 1;
  const [re, im, productRe, productIm] = Array.from({ length: 4 }, () => new Float64Array(bins));
  const [block, band, inPhase, quadrature] = Array.from({ length: 4 }, () => new Float64Array(FFT_LENGTH));
  let filled = half; // zeros before the stream, so that its first sample can be judged
  let blockFromFrame = -half;
  let found: MarkCandidate[] = [];

  const note = (frame: number, envelope: number, likeness: number): void => {
    const candidate = { atS: frame / sampleRateHz, amplitude: envelope / energy, likeness };
    const last = found.at(-1);
    if (last && candidate.atS - last.atS < APART_S) {
      if (candidate.amplitude > last.amplitude) found[found.length - 1] = candidate;
      return;
    }
    found.push(candidate);
    if (found.length > 2 * MOST_CANDIDATES) found = keepLikeliest(found);
  };
  const judge = (): void => {
    fft.transform(block, re, im);
    for (let k = 0; k < bins; k++) {
      re[k] *= kernels.highPass[k];
      im[k] *= kernels.highPass[k];
    }
    correlate(re, im, kernels.inPhase, productRe, productIm);
    invertRealFft(fft, productRe, productIm, inPhase);
    correlate(re, im, kernels.quadrature, productRe, productIm);
    invertRealFft(fft, productRe, productIm, quadrature);
    invertRealFft(fft, re, im, band);
    let total = 0;
    for (let n = half; n < FFT_LENGTH - half; n++) total += band[n] * band[n];
    let local = 0;
    for (let n = half; n < half + markLength; n++) local += band[n] * band[n];
    for (let n = half; n < half + stepFrames; n++) {
      const squared = inPhase[n] * inPhase[n] + quadrature[n] * quadrature[n];
      if (local > ROUNDING * total && squared > LEAST_LIKENESS ** 2 * energy * local) {
        note(blockFromFrame + n, Math.sqrt(squared), Math.min(1, Math.sqrt(squared / (energy * local))));
      }
      local += band[n + markLength] ** 2 - band[n] ** 2;
    }
  };
  const push = (samples: Float64Array): void => {
    for (let taken = 0; taken < samples.length;) {
      const part = samples.subarray(taken, taken + FFT_LENGTH - filled);
      block.set(part, filled);
      filled += part.length;
      taken += part.length;
      if (filled === FFT_LENGTH) {
        judge();
        block.copyWithin(0, stepFrames);
        filled = FFT_LENGTH - stepFrames;
        blockFromFrame += stepFrames;
      }
    }
  };
  return {
    push,
    finish: () => {
      push(new Float64Array(FFT_LENGTH - filled + stepFrames));
      return keepLikeliest(found);
    },
  };
}

function keepLikeliest(candidates: readonly MarkCandidate[]): MarkCandidate[] {
  const byLikeness = [...candidates].sort((one, other) => other.likeness - one.likeness);
  return byLikeness.slice(0, MOST_CANDIDATES).sort((one, other) => one.atS - other.atS);
}
