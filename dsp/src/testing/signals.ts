import { createGaussian } from '../random/create-gaussian.js';
import { createRandom, type Random } from '../random/create-random.js';

export { createGaussian };

export interface Partial {
  readonly frequencyHz: number;
  /** Peak, FS. */
  readonly amplitude: number;
  /** Sine phase at the first sample. */
  readonly phaseRad?: number;
}

/** sin(2π·turns) with the whole turns taken off first, so that long signals keep their accuracy. */
function sinOfTurns(turns: number): number {
  return Math.sin(2 * Math.PI * (turns - Math.floor(turns)));
}

/** Sum of sines; `offset` is a constant part. Turns are counted exactly where frequency/rate is a short fraction. */
export function synthesise(
  length: number,
  sampleRateHz: number,
  partials: readonly Partial[],
  offset = 0,
): Float64Array {
  const samples = new Float64Array(length).fill(offset);
  for (const { frequencyHz, amplitude, phaseRad = 0 } of partials) {
    const phaseTurns = phaseRad / (2 * Math.PI);
    for (let n = 0; n < length; n++) {
      const whole = Math.floor(frequencyHz);
      // n · whole stays an exact integer, so its remainder is exact; only the fraction's product is rounded.
      const turns = ((n * whole) % sampleRateHz) / sampleRateHz + (n * (frequencyHz - whole)) / sampleRateHz;
      samples[n] += amplitude * sinOfTurns(turns + phaseTurns);
    }
  }
  return samples;
}

/** One sine. */
export function sine(
  length: number,
  sampleRateHz: number,
  frequencyHz: number,
  amplitude: number,
  phaseRad = 0,
): Float64Array {
  return synthesise(length, sampleRateHz, [{ frequencyHz, amplitude, phaseRad }]);
}

/** A sine of `cycles` cycles in `length` samples; a whole number of cycles is exactly periodic. */
export function sineOfCycles(length: number, cycles: number, amplitude = 1, phaseRad = 0): Float64Array {
  return sine(length, length, cycles, amplitude, phaseRad);
}

/** White Gaussian noise. @param rms - standard deviation, FS */
export function whiteNoise(length: number, rms: number, seed: number): Float64Array {
  const draw = createGaussian(createRandom(seed));
  return Float64Array.from({ length }, () => rms * draw());
}

/** Adds signals of equal length. */
export function mix(...signals: readonly Float64Array[]): Float64Array {
  return signals[0].map((_, n) => signals.reduce((sum, signal) => sum + signal[n], 0));
}

/** Passes each sample through a polynomial Σ coefficients[k] · x^(k+1). */
export function bend(samples: Float64Array, coefficients: readonly number[]): Float64Array {
  return samples.map((x) => x * coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0));
}

/** Holds samples between two limits. */
export function clip(samples: Float64Array, lowest: number, highest: number): Float64Array {
  return samples.map((x) => Math.min(highest, Math.max(lowest, x)));
}

/** Rounds to `bits` bits as a converter does, with triangular dither of 2 LSB width when `random` is given. */
export function quantise(samples: Float64Array, bits: number, random?: Random): Float64Array {
  const scale = 2 ** (bits - 1);
  return samples.map((x) => {
    const dither = random ? random() - random() : 0;
    return Math.min(scale - 1, Math.max(-scale, Math.floor(x * scale + dither + 0.5))) / scale;
  });
}
