import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import type { Spur } from './find-spurs.js';

/** Mains hum as a spectrum shows it. */
export interface MainsHum {
  readonly frequencyHz: number;
  /** Sum of its lines, FS². */
  readonly meanSquare: number;
  /** Variance of that sum by the noise in its lobes, FS⁴. */
  readonly variance: number;
}

const NOMINAL_HZ = [50, 60];
/** Grids stay within 1 % of their nominal frequency (common practice, no source). */
const GRID_TOLERANCE = 0.01;
/** One of the lowest multiples must be there: 300 Hz alone would be both 6 × 50 and 5 × 60. */
const TELLING_MULTIPLES = 3;
/** Hum is counted below 1 kHz: there the frames of USB begin. */
export const HUM_END_HZ = 980;
/** A lobe wider than this leaves 50 and 60 Hz and their neighbours in one. */
const WIDEST_LOBE_HZ = 21;

/** Whether a spectrum is fine enough to show mains lines apart. */
export function resolvesMains(
  spectrum: Pick<PowerSpectrum, 'binWidthHz' | 'exclusionHalfWidthBins'>,
): boolean {
  return spectrum.exclusionHalfWidthBins * spectrum.binWidthHz <= WIDEST_LOBE_HZ;
}

/**
 * Finds mains hum among the lines of a spectrum.
 *
 * @param spurs - lines that stand out of the noise, without those of a tone and its harmonics
 * @returns the grid's frequency from all its lines below 1 kHz, and their power; null without hum
 */
export function findMains(spectrum: PowerSpectrum, spurs: readonly Spur[]): MainsHum | null {
  if (!resolvesMains(spectrum)) return null;
  const candidates = NOMINAL_HZ.map((nominalHz) => gridOf(spectrum, spurs, nominalHz)).filter(
    (grid) => grid !== null,
  );
  candidates.sort((one, other) => other.meanSquare - one.meanSquare);
  return candidates[0] ?? null;
}

function gridOf(spectrum: PowerSpectrum, spurs: readonly Spur[], nominalHz: number): MainsHum | null {
  const lowest = spurs
    .filter(({ frequencyHz }) => isMultiple(frequencyHz, nominalHz, GRID_TOLERANCE, TELLING_MULTIPLES))
    .sort((one, other) => other.peak - one.peak)[0] as Spur | undefined;
  if (lowest === undefined) return null;
  const first = lowest.frequencyHz / Math.round(lowest.frequencyHz / nominalHz);
  const lines = spurs.filter(
    ({ frequencyHz }) => frequencyHz < HUM_END_HZ && isMainsLine(spectrum, frequencyHz, first),
  );
  // The multiples' places, weighted by how surely each is known and how far it spreads an error: Σ w n f / Σ w n².
  let weighted = 0;
  let weights = 0;
  for (const { frequencyHz, peak } of lines) {
    const multiple = Math.round(frequencyHz / first);
    weighted += peak * multiple * frequencyHz;
    weights += peak * multiple * multiple;
  }
  const { lobes } = removeLobes(
    spectrum,
    lines.map(({ frequencyHz }) => frequencyHz),
  );
  const meanSquare = lobes.reduce((sum, { power }) => sum + Math.max(0, power), 0);
  const variance = lobes.reduce((sum, { standardDeviation }) => sum + standardDeviation ** 2, 0);
  return meanSquare > 0 ? { frequencyHz: weighted / weights, meanSquare, variance } : null;
}

function isMultiple(frequencyHz: number, baseHz: number, tolerance: number, highest: number): boolean {
  const multiple = Math.round(frequencyHz / baseHz);
  return (
    multiple >= 1 &&
    multiple <= highest &&
    Math.abs(frequencyHz - multiple * baseHz) <= tolerance * multiple * baseHz
  );
}

/** Whether a line lies on a multiple of the grid's frequency, as nearly as the spectrum can tell. */
export function isMainsLine(
  spectrum: Pick<PowerSpectrum, 'binWidthHz'>,
  frequencyHz: number,
  gridHz: number,
): boolean {
  const multiple = Math.round(frequencyHz / gridHz);
  // A lowest line known to a tenth of a bin puts the nth multiple out by n tenths.
  const reach = spectrum.binWidthHz * (0.6 + 0.1 * multiple);
  return multiple >= 1 && Math.abs(frequencyHz - multiple * gridHz) <= Math.min(reach, gridHz * 0.05);
}
