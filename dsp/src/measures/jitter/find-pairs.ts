import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { prominenceAt } from '../shared/find-line.js';
import { findSpurs, lineThreshold } from '../shared/find-spurs.js';

/** Sidebands are looked for so far from the tone. */
export const REACH_HZ = 5000;
/** Against the tone, power: the window's own side lobes and the arithmetic lie below. */
const WINDOW_FLOOR = 1e-17;
/** Nearer than so many half-widths of a lobe they are the tone's own skirt. */
const SKIRT = 2;

/**
 * Finds pairs of lines that lie alike on both sides of a tone and both stand 10 dB or more above the noise around them.
 *
 * @returns their distances from the tone, Hz, ascending
 */
export function findPairs(spectrum: PowerSpectrum, toneHz: number): number[] {
  const { binWidthHz, exclusionHalfWidthBins: half, power, effectiveAverages } = spectrum;
  const skirtHz = SKIRT * half * binWidthHz;
  const band = { lowHz: toneHz - REACH_HZ, highHz: toneHz + REACH_HZ };
  const threshold = lineThreshold(effectiveAverages);
  const tone = power[highestNear(power, toneHz / binWidthHz) ?? 0];
  const offsets: number[] = [];
  for (const { frequencyHz, peak } of findSpurs(spectrum, band)) {
    if (peak < WINDOW_FLOOR * tone) continue;
    const offsetHz = Math.abs(frequencyHz - toneHz);
    if (offsetHz < skirtHz || offsetHz > REACH_HZ) continue;
    if (offsets.some((other) => Math.abs(other - offsetHz) < half * binWidthHz)) continue;
    const mirror = toneHz - (frequencyHz - toneHz);
    const bin = highestNear(power, mirror / binWidthHz);
    if (bin !== null && prominenceAt(spectrum, bin) > threshold) offsets.push(offsetHz);
  }
  return offsets.sort((one, other) => one - other);
}

/** The highest bin next to a place. */
function highestNear(power: Float64Array, place: number): number | null {
  const middle = Math.round(place);
  const near = [middle - 1, middle, middle + 1].filter((bin) => bin > 0 && bin < power.length - 1);
  return near.length === 0 ? null : near.reduce((one, other) => (power[other] > power[one] ? other : one));
}
