import { createRealFft, type RealFft } from '../../../spectrum/create-real-fft.js';
import { invertRealFft } from '../../../stimulus/marks/inverse-transform.js';
import { renderSweep, sweepDurationS, sweepTimeS, type SweepSignal } from '../../../stimulus/sweep-signal.js';

/** Recorded before a sweep and after it, from which its response and its echoes are taken. */
export const BEFORE_SWEEP_S = 0.2;
export const AFTER_SWEEP_S = 0.55;

/** Share of the recorder's rate from which its own filter takes the sweep away. */
const RECORDED_SHARE = 0.46;
const RECORDED_END_SHARE = 0.495;
/** The response is faded in between these shares of the sweep's low end and out between these of its high one. */
const LOW_EDGE = [0.5, 1.25] as const;
const HIGH_EDGE = [0.965, 0.998] as const;

export interface DeconvolverOptions {
  readonly sweep: SweepSignal;
  /** The player's clock over the recorder's. */
  readonly speed: number;
  readonly sampleRateHz: number;
  /** Seconds from the first sample handed in to the sweep's beginning. */
  readonly leadS: number;
  /** Samples handed in. */
  readonly frameCount: number;
}

/** Response of a chain to a sweep: index 0 is no delay, negative times wrap to the end. */
export interface ImpulseResponse {
  readonly samples: Float64Array;
  readonly sampleRateHz: number;
}

export interface Deconvolver {
  /** Band in which the sweep was sent and recorded at full strength, Hz of the recording. */
  readonly lowHz: number;
  readonly highHz: number;
  /** @param samples - one channel from `leadS` before the sweep; not modified; shorter ones count as followed by silence */
  deconvolve(samples: Float64Array): ImpulseResponse;
}

/**
 * Divides recordings by the sweep as it was sent: fades, delay and the clocks' offset included, at the recorder's own
 * rate, so that nothing needs to be resampled.
 *
 * @see A. Farina, "Advancements in impulse response measurements by sine sweeps", 122nd AES Convention, 2007: division by
 *   the transform of the sweep itself in place of the analytic inverse
 */
export function createDeconvolver(options: DeconvolverOptions): Deconvolver {
  const { sweep, speed, sampleRateHz, leadS, frameCount } = options;
  const wanted = Math.ceil((sweepDurationS(sweep) / speed + leadS + AFTER_SWEEP_S) * sampleRateHz);
  const length = 2 ** Math.ceil(Math.log2(Math.max(frameCount, wanted)));
  const fft = createRealFft(length);
  const half = length / 2;
  const sent = { re: new Float64Array(half + 1), im: new Float64Array(half + 1) };
  transformSent(fft, options, sent);
  const highHz = Math.min(sweep.highHz * speed * fadedShare(sweep), RECORDED_SHARE * sampleRateHz);
  const lowHz = sweep.lowHz * speed * LOW_EDGE[1];
  const edges = {
    low: LOW_EDGE.map((share) => share * sweep.lowHz * speed) as [number, number],
    high: highEdge(sweep, speed, sampleRateHz),
  };
  invertSent(sent, sampleRateHz / length, edges);
  const re = new Float64Array(half + 1);
  const im = new Float64Array(half + 1);
  const padded = new Float64Array(length);
  return {
    lowHz,
    highHz,
    deconvolve: (samples) => {
      padded.fill(0);
      padded.set(samples.subarray(0, length));
      fft.transform(padded, re, im);
      multiply(re, im, sent.re, sent.im);
      const response = new Float64Array(length);
      invertRealFft(fft, re, im, response);
      return { samples: response, sampleRateHz };
    },
  };
}

/** Where the fade at the end begins, against the high end. */
function fadedShare({ rateS, fadeOutS }: SweepSignal): number {
  return Math.exp(-fadeOutS / rateS);
}

function highEdge(sweep: SweepSignal, speed: number, sampleRateHz: number): [number, number] {
  const sentEnd = sweep.highHz * speed;
  const recordedEnd = RECORDED_END_SHARE * sampleRateHz;
  return sentEnd * HIGH_EDGE[1] < recordedEnd
    ? [sentEnd * HIGH_EDGE[0], sentEnd * HIGH_EDGE[1]]
    : [RECORDED_SHARE * sampleRateHz, 0.485 * sampleRateHz];
}

function transformSent(
  fft: RealFft,
  { sweep, speed, sampleRateHz, leadS }: DeconvolverOptions,
  sent: { readonly re: Float64Array; readonly im: Float64Array },
): void {
  const samples = new Float64Array(fft.length);
  const heardHighHz = (RECORDED_END_SHARE * sampleRateHz) / speed;
  // A sweep beyond what the recorder can hold would fold back in the sampled reference: it ends there.
  const held =
    sweep.highHz <= heardHighHz
      ? sweep
      : {
          ...sweep,
          highHz: heardHighHz,
          fadeOutS:
            sweepTimeS(sweep, heardHighHz) - sweepTimeS(sweep, (RECORDED_SHARE * sampleRateHz) / speed),
        };
  renderSweep(held, -leadS * speed, speed / sampleRateHz, samples);
  fft.transform(samples, sent.re, sent.im);
}

/** Turns a spectrum into its inverse inside the band, faded to nothing at both edges. */
function invertSent(
  { re, im }: { readonly re: Float64Array; readonly im: Float64Array },
  binWidthHz: number,
  { low, high }: { readonly low: readonly [number, number]; readonly high: readonly [number, number] },
): void {
  for (let k = 0; k < re.length; k++) {
    const f = k * binWidthHz;
    const gain = rise(f, low[0], low[1]) * (1 - rise(f, high[0], high[1]));
    const power = re[k] * re[k] + im[k] * im[k];
    const scale = gain > 0 && power > 0 ? gain / power : 0;
    re[k] *= scale;
    im[k] *= -scale;
  }
}

/** Raised cosine from 0 to 1 over the logarithm of frequency. */
function rise(f: number, from: number, to: number): number {
  if (f <= from) return 0;
  if (f >= to) return 1;
  return 0.5 - 0.5 * Math.cos((Math.PI * Math.log(f / from)) / Math.log(to / from));
}

function multiply(re: Float64Array, im: Float64Array, byRe: Float64Array, byIm: Float64Array): void {
  for (let k = 0; k < re.length; k++) {
    const x = re[k] * byRe[k] - im[k] * byIm[k];
    im[k] = re[k] * byIm[k] + im[k] * byRe[k];
    re[k] = x;
  }
}
