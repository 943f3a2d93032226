import { DspInputError } from '../errors.js';
import { TRUE_PEAK_PHASES } from './true-peak-coefficients.js';

export interface TruePeakMeter {
  /** Rate of the interpolated signal. */
  readonly oversampledRateHz: number;
  push(samples: Float64Array): void;
  /** Greatest magnitude so far of samples and values between them, FS; the filter's tail past the end counts. */
  read(): number;
}

const TAPS = 12;
const OVERSAMPLING = 4;
/** Windows looked at together before any of them is interpolated. */
const GROUP = 8;
const BLOCK = 4096;

/** Each phase split into what it makes of sums and of differences of the taps that mirror each other. */
const EVEN = TRUE_PEAK_PHASES.map((h) => Float64Array.from({ length: 6 }, (_, i) => (h[i] + h[11 - i]) / 2));
const ODD = TRUE_PEAK_PHASES.map((h) => Float64Array.from({ length: 6 }, (_, i) => (h[i] - h[11 - i]) / 2));

/** Greatest sum of magnitudes of a phase: no interpolated value exceeds this times the largest of its samples. */
const GREATEST_GAIN = Math.max(
  ...TRUE_PEAK_PHASES.map((h) => h.reduce((sum, tap) => sum + Math.abs(tap), 0)),
);

/** A window's values are at most gain · (its middle samples) + bend · (its greatest second difference). */
function boundByCurvature(): { gain: number; bend: number } {
  let gain = 0;
  let bend = 0;
  for (const h of TRUE_PEAK_PHASES) {
    // About the two middle taps, x[i] = line through them + second differences between, whose weights are distances.
    const atLeft = h.reduce((sum, tap, i) => sum + tap * (6 - i), 0);
    const atRight = h.reduce((sum, tap, i) => sum + tap * (i - 5), 0);
    const weights = new Float64Array(TAPS);
    h.forEach((tap, i) => {
      for (let j = 6; j < i; j++) weights[j] += tap * (i - j);
      for (let j = 5; j > i; j--) weights[j] += tap * (j - i);
    });
    gain = Math.max(gain, Math.abs(atLeft) + Math.abs(atRight));
    bend = Math.max(
      bend,
      weights.reduce((sum, weight) => sum + Math.abs(weight), 0),
    );
  }
  return { gain, bend };
}
const BY_CURVATURE = boundByCurvature();
/** Room for rounding in the bounds. */
const ROUNDING = 1 + 1e-12;

/** Greatest magnitude between the middle taps of the windows that begin at `from` … `to` - 1. */
function interpolatedPeak(x: Float64Array, from: number, to: number): number {
  const [e0, e1] = EVEN;
  const [o0, o1] = ODD;
  let peak = 0;
  for (let n = from; n < to; n++) {
    let even0 = 0;
    let odd0 = 0;
    let even1 = 0;
    let odd1 = 0;
    for (let i = 0; i < 6; i++) {
      const a = x[n + i];
      const b = x[n + 11 - i];
      const sum = a + b;
      const difference = a - b;
      even0 += e0[i] * sum;
      odd0 += o0[i] * difference;
      even1 += e1[i] * sum;
      odd1 += o1[i] * difference;
    }
    // A phase and its mirror: the greater magnitude of even ± odd.
    peak = Math.max(peak, Math.abs(even0) + Math.abs(odd0), Math.abs(even1) + Math.abs(odd1));
  }
  return peak;
}

/**
 * Makes a meter of true peak over a stream of one channel: four-fold interpolation with the standard's 48 taps, the
 * greater of samples and interpolated values. The filter doesn't pass the samples themselves unchanged, hence the
 * samples' own peak beside it.
 *
 * The standard asks for at least 192 kHz after interpolation; four-fold is kept at higher rates too, where it only
 * reads closer. Windows that can't exceed the peak found so far are not interpolated; the bounds are strict, so the
 * reading is the same as with all of them.
 *
 * @throws DspInputError `BAD_ARGUMENT` when the rate isn't above 0
 * @see ITU-R BS.1770-5, Annex 2
 */
export function createTruePeakMeter(sampleRateHz: number): TruePeakMeter {
  if (!(sampleRateHz > 0)) throw new DspInputError('BAD_ARGUMENT', `${sampleRateHz} Hz isn't a sample rate`);
  const margin = TAPS - 1;
  const buffer = new Float64Array(margin + BLOCK);
  let peak = 0;

  /** Windows 0 … count - 1 of the buffer. */
  const scan = (count: number): void => {
    for (let from = 0; from < count; from += GROUP) {
      const to = Math.min(count, from + GROUP);
      const end = to + margin;
      let largest = 0;
      let middle = 0;
      let curvature = 0;
      for (let n = from; n < end; n++) {
        const size = Math.abs(buffer[n]);
        if (size > largest) largest = size;
      }
      if (largest > peak) peak = largest;
      if (largest * GREATEST_GAIN * ROUNDING <= peak) continue;
      for (let n = from + 5; n < to + 6; n++) {
        const size = Math.abs(buffer[n]);
        if (size > middle) middle = size;
      }
      for (let n = from + 1; n < end - 1; n++) {
        const second = Math.abs(buffer[n - 1] - 2 * buffer[n] + buffer[n + 1]);
        if (second > curvature) curvature = second;
      }
      if ((BY_CURVATURE.gain * middle + BY_CURVATURE.bend * curvature) * ROUNDING <= peak) continue;
      peak = Math.max(peak, interpolatedPeak(buffer, from, to));
    }
  };

  return {
    oversampledRateHz: OVERSAMPLING * sampleRateHz,
    push(samples) {
      for (let from = 0; from < samples.length; from += BLOCK) {
        const count = Math.min(BLOCK, samples.length - from);
        buffer.set(samples.subarray(from, from + count), margin);
        scan(count);
        buffer.copyWithin(0, count, count + margin);
      }
    },
    read() {
      const tail = new Float64Array(2 * margin);
      tail.set(buffer.subarray(0, margin));
      return Math.max(peak, interpolatedPeak(tail, 0, margin));
    },
  };
}
