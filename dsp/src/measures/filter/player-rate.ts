import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { bandMean } from './noise-response.js';

const USUAL_RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000];
/** Noise has ended where it lies this far below its level around 1 kHz. */
const ENDED_DB = -20;
const STEP = 1.01;
/** A converter's filter lets noise end between these shares of its rate. */
const LEAST_SHARE = 0.45;
const GREATEST_SHARE = 0.53;
/** The noise of a recorder's own rate ends with the spectrum. */
const RECORDED_SHARE = 0.47;

/**
 * Tells the player's rate by where its noise ends.
 *
 * @returns Hz; null where the noise reaches the recording's own end or ends at none of the usual rates' halves
 */
export function guessPlayerRate(spectrum: PowerSpectrum): number | null {
  const { sampleRateHz } = spectrum;
  const reference = bandMean(spectrum, 800, 1250).mean;
  let endHz = 10_000;
  while (endHz < RECORDED_SHARE * sampleRateHz) {
    const { mean } = bandMean(spectrum, endHz, endHz * STEP);
    if (mean < reference * 10 ** (ENDED_DB / 10)) break;
    endHz *= STEP;
  }
  if (endHz >= RECORDED_SHARE * sampleRateHz) return null;
  const near = USUAL_RATES_HZ.filter((rate) => endHz >= LEAST_SHARE * rate && endHz <= GREATEST_SHARE * rate);
  const distance = (rate: number): number => Math.abs(endHz / rate - 0.5);
  return near.length === 0
    ? null
    : near.reduce((one, other) => (distance(other) < distance(one) ? other : one));
}
