import { createRealFft } from '../../../spectrum/create-real-fft.js';
import type { ImpulseResponse } from './create-deconvolver.js';

/** Part of an impulse response that is looked at; times from its index 0. */
export interface ImpulseCut {
  readonly centreS: number;
  /** Flat part and tapers together. */
  readonly beforeS: number;
  readonly afterS: number;
}

/** Complex response, phases against the cut's centre. */
export interface FrequencyResponse {
  readonly binWidthHz: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** Share of each side that the taper takes. */
const TAPER = 0.5;

function taperGain(fromCentre: number, reach: number): number {
  const flat = reach * (1 - TAPER);
  if (fromCentre <= flat) return 1;
  return 0.5 + 0.5 * Math.cos((Math.PI * (fromCentre - flat)) / (reach - flat));
}

/**
 * Transforms a part of an impulse response, cut out with cosine tapers.
 *
 * @param minLength - the transform is at least so long; zeros between the points of a shorter cut draw it more finely
 */
export function transformCut(
  { samples, sampleRateHz }: ImpulseResponse,
  { centreS, beforeS, afterS }: ImpulseCut,
  minLength = 0,
): FrequencyResponse {
  const before = Math.round(beforeS * sampleRateHz);
  const after = Math.round(afterS * sampleRateHz);
  const centre = Math.round(centreS * sampleRateHz);
  const length = 2 ** Math.ceil(Math.log2(Math.max(before + after + 1, minLength, 16)));
  const cut = new Float64Array(length);
  const total = samples.length;
  for (let n = -before; n <= after; n++) {
    const gain = taperGain(Math.abs(n), n < 0 ? before : after);
    cut[(n + length) % length] = gain * samples[(((centre + n) % total) + total) % total];
  }
  const re = new Float64Array(length / 2 + 1);
  const im = new Float64Array(length / 2 + 1);
  createRealFft(length).transform(cut, re, im);
  // The centre may lie between samples: the rest of its place is taken out as phase.
  const rest = centreS * sampleRateHz - centre;
  if (rest !== 0) turnBack(re, im, (2 * Math.PI * rest) / length);
  return { binWidthHz: sampleRateHz / length, re, im };
}

function turnBack(re: Float64Array, im: Float64Array, radiansPerBin: number): void {
  for (let k = 0; k < re.length; k++) {
    const [c, s] = [Math.cos(radiansPerBin * k), Math.sin(radiansPerBin * k)];
    const x = re[k] * c - im[k] * s;
    im[k] = re[k] * s + im[k] * c;
    re[k] = x;
  }
}

/** Energy of a cut's window: the sum of its squared gains. */
export function cutEnergy({ beforeS, afterS }: ImpulseCut, sampleRateHz: number): number {
  const before = Math.round(beforeS * sampleRateHz);
  const after = Math.round(afterS * sampleRateHz);
  let energy = 0;
  for (let n = -before; n <= after; n++) energy += taperGain(Math.abs(n), n < 0 ? before : after) ** 2;
  return energy;
}

/** Power of a response at a frequency, between bins by its logarithm. */
export function powerAt({ re, im, binWidthHz }: FrequencyResponse, frequencyHz: number): number {
  const place = frequencyHz / binWidthHz;
  const k = Math.min(re.length - 2, Math.max(0, Math.floor(place)));
  const low = re[k] * re[k] + im[k] * im[k];
  const high = re[k + 1] * re[k + 1] + im[k + 1] * im[k + 1];
  const share = Math.min(1, Math.max(0, place - k));
  if (!(low > 0 && high > 0)) return Math.max(low, high);
  return low * (high / low) ** share;
}

/** Mean power of a response over a share of an octave either side of a frequency. */
export function meanPowerAt(response: FrequencyResponse, frequencyHz: number, octaves: number): number {
  const { re, im, binWidthHz } = response;
  const first = Math.max(0, Math.ceil((frequencyHz * 2 ** -octaves) / binWidthHz));
  const last = Math.min(re.length - 1, Math.floor((frequencyHz * 2 ** octaves) / binWidthHz));
  if (last <= first) return powerAt(response, frequencyHz);
  let sum = 0;
  for (let k = first; k <= last; k++) sum += re[k] * re[k] + im[k] * im[k];
  return sum / (last - first + 1);
}
