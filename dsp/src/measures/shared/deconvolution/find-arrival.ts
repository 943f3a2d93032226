import { fitExcessDelay } from './excess-delay.js';
import { transformCut, type FrequencyResponse } from './frequency-response.js';
import type { ImpulseResponse } from './create-deconvolver.js';

/** Where a response arrives, and which way up. */
export interface Arrival {
  readonly delayS: number;
  /** Growth of the delay with ln f, seconds; 0 unless it was sought. */
  readonly perLogS: number;
  readonly isInverted: boolean;
  /** Magnitude of the highest sample. */
  readonly peak: number;
}

/** Around the highest sample: a filter's own phase lasts longer after it. */
const BEFORE_S = 0.1;
const AFTER_S = 0.25;
/** Below this a cut as short as that says little. */
const LOW_HZ = 20;

/**
 * Finds the arrival of a response: the highest sample, then the delay that its phase holds beyond a filter's own.
 *
 * @param searchS - how far from no delay it may lie; null for anywhere
 * @param highHz - end of the band in which there is a response
 * @param seeksClock - whether the delay's growth with frequency is wanted too
 * @returns null for a response of zeros
 */
export function findArrival(
  impulse: ImpulseResponse,
  searchS: number | null,
  highHz: number,
  seeksClock = false,
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
  const response = transformCut(impulse, { centreS: rough, beforeS: BEFORE_S, afterS: AFTER_S });
  const isInverted = samples[(at + total) % total] < 0;
  const { delayS, perLogS } = fitExcessDelay(response, { lowHz: LOW_HZ, highHz, isInverted, seeksClock });
  return { delayS: rough + delayS, perLogS, isInverted, peak: best };
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
