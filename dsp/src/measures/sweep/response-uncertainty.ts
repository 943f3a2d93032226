import type { ImpulseResponse } from '../shared/deconvolution/create-deconvolver.js';
import {
  cutEnergy,
  meanPowerAt,
  powerAt,
  transformCut,
  type FrequencyResponse,
  type ImpulseCut,
} from '../shared/deconvolution/frequency-response.js';
import type { UncertaintyComponent } from '../shared/uncertainty.js';

/** Where no response is left after its arrival: what stands there is noise, or echoes that count as such. */
const NOISE_CENTRE_S = 0.42;
const NOISE_REACH_S = 0.07;
const NOISE_OCTAVES = 1 / 6;
/** A noiseless chain reads within so much of its closed form; rectangular. @see JCGM 100:2008, 4.3.7 */
const METHOD_DB = 0.01 / Math.sqrt(3);
/** dB of a small in-phase part of an amplitude: 20 / ln 10. */
const DB_PER_RELATIVE_AMPLITUDE = 20 / Math.LN10;

/** Gives the standard deviation that noise lends a response's level at a frequency, dB. */
export type ResponseNoise = (frequencyHz: number) => number;

/**
 * Reads the noise of a response where the response is over: half its power lies in phase with the response.
 *
 * @param arrivalS - the response's arrival in the impulse
 * @param cut - what the response itself was taken from
 */
export function readResponseNoise(
  impulse: ImpulseResponse,
  arrivalS: number,
  response: FrequencyResponse,
  cut: ImpulseCut,
): ResponseNoise {
  const noiseCut = {
    centreS: arrivalS + NOISE_CENTRE_S,
    beforeS: NOISE_REACH_S,
    afterS: NOISE_REACH_S,
  };
  const noise = transformCut(impulse, noiseCut);
  const scale = cutEnergy(cut, impulse.sampleRateHz) / cutEnergy(noiseCut, impulse.sampleRateHz);
  return (frequencyHz) => {
    const power = powerAt(response, frequencyHz);
    const noisePower = scale * meanPowerAt(noise, frequencyHz, NOISE_OCTAVES);
    return power > 0 ? DB_PER_RELATIVE_AMPLITUDE * Math.sqrt(noisePower / (2 * power)) : Number.NaN;
  };
}

/** Components of a level against another frequency's, dB. */
export function levelComponents(
  noiseAt: ResponseNoise,
  frequencyHz: number,
  referenceHz: number,
): readonly UncertaintyComponent[] {
  return [
    { name: 'noise', value: noiseAt(frequencyHz) },
    { name: 'noise at 1 kHz', value: noiseAt(referenceHz) },
    { name: 'method', value: METHOD_DB },
  ];
}

/** Components of half the difference between the highest and the lowest level, dB. */
export function flatnessComponents(
  noiseAt: ResponseNoise,
  highestHz: number,
  lowestHz: number,
): readonly UncertaintyComponent[] {
  return [
    { name: 'noise', value: Math.hypot(noiseAt(highestHz), noiseAt(lowestHz)) / 2 },
    { name: 'method', value: METHOD_DB },
  ];
}

/**
 * Components of a half-power frequency, Hz.
 *
 * @param dbPerHz - steepness of the response there: an error in level moves the crossing by so much less the steeper it is
 */
export function crossingComponents(
  noiseAt: ResponseNoise,
  frequencyHz: number,
  referenceHz: number,
  dbPerHz: number,
): readonly UncertaintyComponent[] {
  return levelComponents(noiseAt, frequencyHz, referenceHz).map(({ name, value }) => ({
    name,
    value: value / Math.abs(dbPerHz),
  }));
}
