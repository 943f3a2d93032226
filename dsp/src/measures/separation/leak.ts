import { powerToDb } from '../../level/decibel.js';
import type { ImpulseResponse } from '../shared/deconvolution/create-deconvolver.js';
import {
  meanPowerAt,
  powerAt,
  transformCut,
  type FrequencyResponse,
} from '../shared/deconvolution/frequency-response.js';

/** What leaks is looked at so long around the driven channel's arrival. */
const BEFORE_S = 0.06;
const AFTER_S = 0.12;
/** Noise is looked at so long after it, where no response is left. */
const NOISE_AFTER_S = 0.34;
/** A leak below so many times the noise in its place is only bounded. */
const LEAST_OVER_NOISE = 4;
const SMOOTHING_OCTAVES = 1 / 24;
const NOISE_OCTAVES = 1 / 6;

/** How far the idle channel lies under the driven one at a frequency. */
export interface LeakReading {
  readonly frequencyHz: number;
  /** dB, positive is good; null where the noise hides the leak. */
  readonly separationDb: number | null;
  /** At least so much where it is null. */
  readonly atLeastDb: number;
}

/** Makes a reader of one direction: from a driven channel into the idle one. */
export function createLeakReader(
  driven: ImpulseResponse,
  idle: ImpulseResponse,
  arrivalS: number,
): (frequencyHz: number) => LeakReading {
  const cut = { centreS: arrivalS, beforeS: BEFORE_S, afterS: AFTER_S };
  const from = transformCut(driven, cut);
  const into = transformCut(idle, cut);
  const noise = transformCut(idle, { ...cut, centreS: arrivalS + NOISE_AFTER_S });
  return (frequencyHz) => readLeak(from, into, noise, frequencyHz);
}

function readLeak(
  from: FrequencyResponse,
  into: FrequencyResponse,
  noise: FrequencyResponse,
  frequencyHz: number,
): LeakReading {
  const driven = powerAt(from, frequencyHz);
  const leaked = meanPowerAt(into, frequencyHz, SMOOTHING_OCTAVES);
  const floor = meanPowerAt(noise, frequencyHz, NOISE_OCTAVES);
  const isClear = leaked > LEAST_OVER_NOISE * floor && leaked > 0 && driven > 0;
  return {
    frequencyHz,
    separationDb: isClear ? powerToDb(driven / (leaked - floor)) : null,
    atLeastDb: driven > 0 ? powerToDb(driven / Math.max(leaked, floor, driven * 1e-20)) : 0,
  };
}
