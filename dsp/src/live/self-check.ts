import { dbToRatio } from '../level/decibel.js';
import { createRealFft } from '../spectrum/create-real-fft.js';
import { invertRealFft } from '../stimulus/marks/inverse-transform.js';
import { markAt, MARK_DURATION_S } from '../stimulus/mark-chirp.js';

/** Where each output's chirp begins, seconds. */
export const SELF_CHECK_LEFT_S = 0.2;
export const SELF_CHECK_RIGHT_S = 1.2;
export const SELF_CHECK_DURATION_S = 2;
export const SELF_CHECK_LEVEL_DBFS = -20;

/** What came back of one output's chirp. */
export interface SelfCheckReturn {
  /** The input it came back on; null for none. */
  readonly input: 'left' | 'right' | 'both' | null;
  /** Against the level sent, dB; null for none. */
  readonly gainDb: number | null;
  readonly polarity: 'same' | 'inverted' | null;
  /** From the chirp's place in the recording as sent, seconds. */
  readonly latencyS: number | null;
}

export interface SelfCheckResult {
  readonly left: SelfCheckReturn;
  readonly right: SelfCheckReturn;
}

/** A correlation peak so many times the recording's usual correlation is no chance. */
const LEAST_OVER_USUAL = 12;
/** A channel this far below the other holds a leak, not the signal. */
const LEAK_SHARE = 0.1;
const NOTHING: SelfCheckReturn = { input: null, gainDb: null, polarity: null, latencyS: null };

/**
 * Renders the signal that a rig checks itself with: the marks' chirp (2 to 6 kHz, 60 ms, -20 dBFS) on the left output,
 * then on the right one.
 *
 * @returns one array a channel, linear
 */
export function renderSelfCheck(sampleRateHz: number): [Float64Array, Float64Array] {
  const peak = dbToRatio(SELF_CHECK_LEVEL_DBFS);
  const frames = Math.round(SELF_CHECK_DURATION_S * sampleRateHz);
  const chirpAt = (fromS: number) =>
    Float64Array.from({ length: frames }, (_, n) => peak * markAt(n / sampleRateHz - fromS));
  return [chirpAt(SELF_CHECK_LEFT_S), chirpAt(SELF_CHECK_RIGHT_S)];
}

/**
 * Finds the self-check in a recording: level, channel order, polarity and latency.
 *
 * @param channels - one or two, the recording from the moment at which playing began; linear
 * @see a matched filter: J. G. Proakis and M. Salehi, "Digital Communications", chapter on optimum receivers
 */
export function readSelfCheck(channels: readonly Float64Array[], sampleRateHz: number): SelfCheckResult {
  const correlations = channels.slice(0, 2).map((samples) => correlate(samples, sampleRateHz));
  const half = (SELF_CHECK_RIGHT_S - SELF_CHECK_LEFT_S) * sampleRateHz;
  const read = (fromS: number): SelfCheckReturn => {
    const from = Math.round(fromS * sampleRateHz);
    return readReturn(
      correlations.map((values) => values.subarray(from, from + Math.floor(half))),
      sampleRateHz,
    );
  };
  return { left: read(SELF_CHECK_LEFT_S), right: read(SELF_CHECK_RIGHT_S) };
}

function readReturn(correlations: readonly Float64Array[], sampleRateHz: number): SelfCheckReturn {
  const peaks = correlations.map((values) => {
    let at = 0;
    for (let n = 1; n < values.length; n++) if (Math.abs(values[n]) > Math.abs(values[at])) at = n;
    const usual = values.map(Math.abs).sort()[values.length >> 1] ?? 0;
    const value = values[at] ?? 0;
    return { at, value, isClear: Math.abs(value) > LEAST_OVER_USUAL * usual && Math.abs(value) > 1e-4 };
  });
  const most = Math.max(...peaks.map(({ value, isClear }) => (isClear ? Math.abs(value) : 0)));
  if (most === 0) return NOTHING;
  const heard = peaks.map(({ value, isClear }) => isClear && Math.abs(value) > LEAK_SHARE * most);
  const strongest = peaks.find(({ value }) => Math.abs(value) === most);
  return {
    input: heard[0] && heard[1] ? 'both' : heard[0] ? 'left' : 'right',
    gainDb: 20 * Math.log10(most),
    polarity: (strongest?.value ?? 0) < 0 ? 'inverted' : 'same',
    latencyS: (strongest?.at ?? 0) / sampleRateHz,
  };
}

/** Correlation with the chirp as sent, so that 1 is the level sent; by way of the spectrum. */
function correlate(samples: Float64Array, sampleRateHz: number): Float64Array {
  const chirpFrames = Math.ceil(MARK_DURATION_S * sampleRateHz);
  const length = 2 ** Math.ceil(Math.log2(samples.length + chirpFrames));
  const fft = createRealFft(length);
  const transform = (values: (n: number) => number) => {
    const re = new Float64Array(length / 2 + 1);
    const im = new Float64Array(length / 2 + 1);
    fft.transform(
      Float64Array.from({ length }, (_, n) => values(n)),
      re,
      im,
    );
    return { re, im };
  };
  const peak = dbToRatio(SELF_CHECK_LEVEL_DBFS);
  let energy = 0;
  for (let n = 0; n < chirpFrames; n++) energy += (peak * markAt(n / sampleRateHz)) ** 2;
  const x = transform((n) => samples[n] ?? 0);
  const h = transform((n) => (n < chirpFrames ? (peak * markAt(n / sampleRateHz)) / energy : 0));
  const re = x.re.map((value, k) => value * h.re[k] + x.im[k] * h.im[k]);
  const im = x.im.map((value, k) => value * h.re[k] - x.re[k] * h.im[k]);
  const result = new Float64Array(length);
  invertRealFft(fft, re, im, result);
  return result.subarray(0, samples.length);
}
