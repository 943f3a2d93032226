/** A second-order section, a0 = 1. */
export interface Biquad {
  readonly b: readonly [number, number, number];
  readonly a: readonly [number, number, number];
}

const SHELF = { f0: 1681.974450955533, gainDb: 3.999843853973347, q: 0.7071752369554196 };
const SHELF_EXPONENT = 0.4996667741545416;
const HIGH_PASS = { f0: 38.13547087602444, q: 0.5003270373238773 };
/** Gain at 997 Hz that makes a full-scale sine in one front channel read -3.01 LUFS at every rate. */
const GAIN_997_DB = 0.691;
const CALIBRATION_HZ = 997;

function design(f0: number, q: number, sampleRateHz: number) {
  const k = Math.tan((Math.PI * f0) / sampleRateHz);
  const a0 = 1 + k / q + k * k;
  const a = [1, (2 * (k * k - 1)) / a0, (1 - k / q + k * k) / a0] as const;
  return { k, a0, a };
}

/**
 * Designs the K weighting for a rate by the bilinear transform of its prototype.
 *
 * @returns the shelf and the high-pass, as published for 48 kHz
 * @see ITU-R BS.1770-5, Annex 1, Tables 1 and 2 (read in a transcription); the prototype behind the coefficients is
 *   derived from them and reproduces both tables
 */
export function designKWeighting(sampleRateHz: number): readonly [Biquad, Biquad] {
  const shelf = design(SHELF.f0, SHELF.q, sampleRateHz);
  const vh = 10 ** (SHELF.gainDb / 20);
  const vb = vh ** SHELF_EXPONENT;
  const { k } = shelf;
  const b = [
    (vh + (vb * k) / SHELF.q + k * k) / shelf.a0,
    (2 * (k * k - vh)) / shelf.a0,
    (vh - (vb * k) / SHELF.q + k * k) / shelf.a0,
  ] as const;
  const highPass = design(HIGH_PASS.f0, HIGH_PASS.q, sampleRateHz);
  return [
    { b, a: shelf.a },
    { b: [1, -2, 1], a: highPass.a },
  ];
}

/** Gain of a chain of sections at a frequency, dB. */
export function gainDbOf(sections: readonly Biquad[], frequencyHz: number, sampleRateHz: number): number {
  const w = (2 * Math.PI * frequencyHz) / sampleRateHz;
  const powerOf = (c: readonly [number, number, number]): number => {
    const re = c[0] + c[1] * Math.cos(w) + c[2] * Math.cos(2 * w);
    const im = c[1] * Math.sin(w) + c[2] * Math.sin(2 * w);
    return re * re + im * im;
  };
  return sections.reduce((sum, { b, a }) => sum + 10 * Math.log10(powerOf(b) / powerOf(a)), 0);
}

/** Filters a stream in place of a copy. */
export interface KFilter {
  /** @returns the mean-square sum of the weighted samples, from one index to another; its state goes on */
  sumOfSquares(samples: Float64Array, from: number, to: number): number;
}

/** Makes a K-weighting meter of one channel's power at any rate. */
export function createKFilter(sampleRateHz: number): KFilter {
  const sections = designKWeighting(sampleRateHz);
  const [{ b: sb, a: sa }, { a: ha }] = sections;
  // The tables' high-pass has no unit gain, and the bilinear one's differs from rate to rate by up to 0.03 dB.
  const scale = 10 ** ((GAIN_997_DB - gainDbOf(sections, CALIBRATION_HZ, sampleRateHz)) / 10);
  let [s1, s2, h1, h2] = [0, 0, 0, 0];
  return {
    sumOfSquares: (samples, from, to) => {
      let sum = 0;
      for (let n = from; n < to; n++) {
        const x = samples[n];
        const y = sb[0] * x + s1;
        s1 = sb[1] * x - sa[1] * y + s2;
        s2 = sb[2] * x - sa[2] * y;
        const z = y + h1;
        h1 = -2 * y - ha[1] * z + h2;
        h2 = y - ha[2] * z;
        sum += z * z;
      }
      // Denormal numbers would slow a silence down by a hundred times.
      if (Math.abs(s1) < 1e-200) [s1, s2] = [0, 0];
      if (Math.abs(h1) < 1e-200) [h1, h2] = [0, 0];
      return sum * scale;
    },
  };
}
