import { dbToPower } from '../level/decibel.js';

export type WeightingName = 'none' | 'a' | 'c' | 'itu-468' | 'itu-468-rms';

const F1_HZ = 20.5989970576183;
const F2_HZ = 107.652648643046;
const F3_HZ = 737.86223073629;
const F4_HZ = 12194.217147998;

/** CCIR-RMS: the curve of BS.468 brought to unity at 2 kHz. */
const ITU_468_RMS_OFFSET_DB = -5.63;

function cPower(frequencyHz: number): number {
  const f2 = frequencyHz * frequencyHz;
  const amplitude = (F4_HZ * F4_HZ * f2) / ((f2 + F1_HZ * F1_HZ) * (f2 + F4_HZ * F4_HZ));
  return amplitude * amplitude;
}

function aPower(frequencyHz: number): number {
  const f2 = frequencyHz * frequencyHz;
  return (cPower(frequencyHz) * f2 * f2) / ((f2 + F2_HZ * F2_HZ) * (f2 + F3_HZ * F3_HZ));
}

function itu468Power(frequencyHz: number): number {
  const f = frequencyHz;
  const f2 = f * f;
  const h1 = 1 + f2 * (-1.363894795463638e-7 + f2 * (2.043828333606125e-15 + f2 * -4.737338981378384e-24));
  const h2 = f * (5.559488023498642e-4 + f2 * (-2.118150887518656e-11 + f2 * 1.306612257412824e-19));
  const numerator = 1.246332637532143e-4 * f;
  return (numerator * numerator) / (h1 * h1 + h2 * h2);
}

const A_AT_1KHZ = aPower(1000);
const C_AT_1KHZ = cPower(1000);
const ITU_468_AT_1KHZ = itu468Power(1000);
const ITU_468_RMS_FACTOR = dbToPower(ITU_468_RMS_OFFSET_DB);

/**
 * Gives a weighting's power factor at a frequency, from the analytic response.
 *
 * @param frequencyHz - ≥ 0
 * @returns linear power factor: 1 at 1 kHz, but for `itu-468-rms` (CCIR-RMS), which is 1 at 2 kHz; 0 at 0 Hz, but for
 *   `none`
 * @see IEC 61672-1:2013, Annex E (A and C)
 * @see ITU-R BS.468-4, Fig. 1a (`itu-468`; the rational form is a widely published one that meets its Table 1)
 * @see AES17-2015, 5.2.7 (`itu-468-rms`: less 5.63 dB, with an RMS meter)
 */
export function weightingPower(name: WeightingName, frequencyHz: number): number {
  switch (name) {
    case 'none':
      return 1;
    case 'a':
      return aPower(frequencyHz) / A_AT_1KHZ;
    case 'c':
      return cPower(frequencyHz) / C_AT_1KHZ;
    case 'itu-468':
      return itu468Power(frequencyHz) / ITU_468_AT_1KHZ;
    case 'itu-468-rms':
      return (itu468Power(frequencyHz) / ITU_468_AT_1KHZ) * ITU_468_RMS_FACTOR;
  }
}

/** Gives a weighting in dB at a frequency: `weightingPower` as a level, -Infinity at 0 Hz but for `none`. */
export function weightingDb(name: WeightingName, frequencyHz: number): number {
  return 10 * Math.log10(weightingPower(name, frequencyHz));
}

/**
 * Makes the power factors of a weighting for every bin of a spectrum.
 *
 * Applied to power bins a weighting is exact; a filter in time would fall off near half the sample rate.
 *
 * @param binCount - number of bins, N/2 + 1
 * @param binWidthHz - distance between bins
 * @returns one factor a bin
 */
export function createWeightingFactors(
  name: WeightingName,
  binCount: number,
  binWidthHz: number,
): Float64Array {
  const factors = new Float64Array(binCount);
  for (let k = 0; k < binCount; k++) factors[k] = weightingPower(name, k * binWidthHz);
  return factors;
}
