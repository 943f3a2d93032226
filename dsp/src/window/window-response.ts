import { ratioToDb } from '../level/decibel.js';
import { WINDOW_COEFFICIENTS, type WindowName } from './window-coefficients.js';

/** sin(πd)/(πd), with the removable point at 0. */
function sinc(d: number): number {
  return d === 0 ? 1 : Math.sin(Math.PI * d) / (Math.PI * d);
}

/**
 * Gives a window's transform between bins, in the limit of a long window, against its value at the centre.
 *
 * @param offsetBins - distance from the tone, bins; any sign
 * @returns real, 1 at 0; its sign changes from side lobe to side lobe
 */
export function windowResponse(name: WindowName, offsetBins: number): number {
  const coefficients = WINDOW_COEFFICIENTS[name];
  let sum = coefficients[0] * sinc(offsetBins);
  for (let k = 1; k < coefficients.length; k++) {
    // The sign of each cosine term cancels against its shift's: in the transform all add up.
    sum += 0.5 * coefficients[k] * (sinc(offsetBins - k) + sinc(offsetBins + k));
  }
  return sum / coefficients[0];
}

/** Gives what a tone halfway between two bins loses in the level spectrum, dB ≥ 0. */
export function scallopingLossDb(name: WindowName): number {
  return -ratioToDb(Math.abs(windowResponse(name, 0.5)));
}

/**
 * Gives the height of the highest side lobe, dB against the main lobe, looked for over 60 bins.
 *
 * Between nulls, which lie on whole bins beyond the main lobe, a side lobe is smooth: steps of 1/256 bin find its top
 * within 0.001 dB.
 */
export function highestSideLobeDb(name: WindowName): number {
  const firstNull = WINDOW_COEFFICIENTS[name].length;
  let highest = 0;
  for (let step = 0; step < 60 * 256; step++) {
    highest = Math.max(highest, Math.abs(windowResponse(name, firstNull + step / 256)));
  }
  return ratioToDb(highest);
}
