import { createMarkCorrelator, FFT_LENGTH } from './create-mark-correlator.js';

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

/**
 * Noise of the marks' band reaches it once in e^(0.16 · 240) tries: 240 is a mark's product of duration and bandwidth.
 * A mark reaches it down to 7 dB of noise in its band above itself.
 */
const LEAST_LIKENESS = 0.4;
/** Maxima closer than this belong to one mark. */
const APART_S = 0.03;
const MOST_CANDIDATES = 400;
/** Energy, against the block's, below which only the transform's rounding is left. */
const ROUNDING = 1e-13;

function keepLikeliest(candidates: readonly MarkCandidate[]): MarkCandidate[] {
  const byLikeness = [...candidates].sort((one, other) => other.likeness - one.likeness);
  return byLikeness.slice(0, MOST_CANDIDATES).sort((one, other) => one.atS - other.atS);
}

/** Keeps the strongest of candidates that lie close together, and not more than can be looked at. */
function createCollector() {
  let found: MarkCandidate[] = [];
  return {
    add: (candidate: MarkCandidate): void => {
      const last = found.at(-1);
      if (last && candidate.atS - last.atS < APART_S) {
        if (candidate.amplitude > last.amplitude) found[found.length - 1] = candidate;
        return;
      }
      found.push(candidate);
      if (found.length > 2 * MOST_CANDIDATES) found = keepLikeliest(found);
    },
    list: (): MarkCandidate[] => keepLikeliest(found),
  };
}

function sumOfSquares(samples: Float64Array, from: number, to: number): number {
  let sum = 0;
  for (let n = from; n < to; n++) sum += samples[n] * samples[n];
  return sum;
}

/**
 * Makes a finder of marks: a matched filter whose result is held against the energy of what it looks at. Memory doesn't
 * grow with the stream.
 *
 * @param sampleRateHz - of the stream, lowered already
 */
export function createCandidateFinder(sampleRateHz: number): CandidateFinder {
  const correlator = createMarkCorrelator(sampleRateHz);
  const { markLength, edgeLength, energy } = correlator;
  const stepFrames = FFT_LENGTH - markLength - 2 * edgeLength;
  const leastSquared = LEAST_LIKENESS ** 2 * energy;
  const block = new Float64Array(FFT_LENGTH);
  const collector = createCollector();
  let filled = edgeLength; // zeros before the stream, so that its first sample can be judged
  let blockFromFrame = -edgeLength;

  const judge = (): void => {
    const { band, squaredEnvelope } = correlator.correlate(block);
    const least = ROUNDING * sumOfSquares(band, edgeLength, FFT_LENGTH - edgeLength);
    let local = sumOfSquares(band, edgeLength, edgeLength + markLength);
    for (let n = edgeLength; n < edgeLength + stepFrames; n++) {
      const squared = squaredEnvelope[n];
      if (local > least && squared > leastSquared * local) {
        collector.add({
          atS: (blockFromFrame + n) / sampleRateHz,
          amplitude: Math.sqrt(squared) / energy,
          likeness: Math.min(1, Math.sqrt(squared / (energy * local))),
        });
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
      if (filled < FFT_LENGTH) continue;
      judge();
      block.copyWithin(0, stepFrames);
      filled = FFT_LENGTH - stepFrames;
      blockFromFrame += stepFrames;
    }
  };
  return {
    push,
    finish: () => {
      push(new Float64Array(FFT_LENGTH - filled + stepFrames));
      return collector.list();
    },
  };
}
