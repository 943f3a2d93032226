import { transformCut, type FrequencyResponse } from './frequency-response.js';
import type { ImpulseResponse } from './create-deconvolver.js';

/** Where a response arrives, and which way up. */
export interface Arrival {
  readonly delayS: number;
  readonly isInverted: boolean;
}

const CUT_S = 0.02;
const LOW_HZ = 300;
/** Phases are compared up to this share of the band's end. */
const HIGH_SHARE = 0.5;

/**
 * Finds the arrival of a response: the highest sample, then the slope of its phase.
 *
 * @param searchS - how far from no delay it may lie; null for anywhere
 * @param highHz - end of the band in which there is a response
 * @returns null for a response of zeros
 */
export function findArrival(
  impulse: ImpulseResponse,
  searchS: number | null,
  highHz: number,
): Arrival | null {
  const { samples, sampleRateHz } = impulse;
  const total = samples.length;
  const reach =
    searchS === null ? total / 2 - 1 : Math.min(total / 2 - 1, Math.round(searchS * sampleRateHz));
  let [best, at] = [0, 0];
  for (let n = -reach; n <= reach; n++) {
    const size = Math.abs(samples[(n + total) % total]);
    if (size > best) [best, at] = [size, n];
  }
  if (best === 0) return null;
  const rough = at / sampleRateHz;
  const response = transformCut(impulse, { centreS: rough, beforeS: CUT_S, afterS: CUT_S });
  const { delayS, phase } = phaseSlope(response, LOW_HZ, HIGH_SHARE * highHz);
  return { delayS: rough + delayS, isInverted: Math.cos(phase) < 0 };
}

/**
 * Fits a straight line through a response's phase, weighted by its power.
 *
 * @returns the delay it means, seconds, and the phase at 0 Hz, radians: near 0 or π for what passes unturned or inverted
 */
export function phaseSlope(
  { re, im, binWidthHz }: FrequencyResponse,
  lowHz: number,
  highHz: number,
): { readonly delayS: number; readonly phase: number } {
  const first = Math.max(1, Math.ceil(lowHz / binWidthHz));
  const last = Math.min(re.length - 1, Math.floor(highHz / binWidthHz));
  let [sumW, sumF, sumP, sumFF, sumFP] = [0, 0, 0, 0, 0];
  let unwrapped = 0;
  let before: number | null = null;
  for (let k = first; k <= last; k++) {
    const phase = Math.atan2(im[k], re[k]);
    if (before === null) unwrapped = phase;
    else {
      const step = phase - before;
      unwrapped += step - 2 * Math.PI * Math.round(step / (2 * Math.PI));
    }
    before = phase;
    const weight = re[k] * re[k] + im[k] * im[k];
    sumW += weight;
    sumF += weight * k;
    sumP += weight * unwrapped;
    sumFF += weight * k * k;
    sumFP += weight * k * unwrapped;
  }
  const spread = sumW * sumFF - sumF * sumF;
  if (!(spread > 0)) return { delayS: 0, phase: 0 };
  const slope = (sumW * sumFP - sumF * sumP) / spread;
  return { delayS: -slope / (2 * Math.PI * binWidthHz), phase: (sumP - slope * sumF) / sumW };
}
