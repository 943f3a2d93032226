import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { Warning } from '../../record/record.js';
import type { AnalysisSettings } from '../measure.js';

/** @see AES17-2015: the standard measuring band */
export const BAND_LOW_HZ = 20;
export const BAND_HIGH_HZ = 20_000;
export const HIGHEST_HARMONIC = 10;

/** Share of the rate up to which converters pass a signal unharmed (common practice, no source). */
const USABLE_SHARE = 0.45;
/** Beyond this share of the rate a band holds the converters' filters. 20 kHz at 44.1 kHz is 0.4535. */
const DOUBTFUL_SHARE = 0.46;
/** A tone above this share of the usual band's end has no room beside it. */
const CROWDED_SHARE = 0.95;

export interface Band {
  readonly lowHz: number;
  readonly highHz: number;
  readonly warnings: readonly Warning[];
}

/**
 * Settles the band of an analysis.
 *
 * @param toneHz - the tone's frequency, or null without one; a tone at or beyond 20 kHz widens the band unless one was asked for
 * @throws DspInputError `BAD_ARGUMENT` for a band that isn't one
 */
export function settleBand(settings: AnalysisSettings, sampleRateHz: number, toneHz: number | null): Band {
  const lowHz = settings.bandLowHz ?? BAND_LOW_HZ;
  const asked = settings.bandHighHz ?? BAND_HIGH_HZ;
  if (!(lowHz >= 0 && asked > lowHz && Number.isFinite(asked))) {
    throw new DspInputError('BAD_ARGUMENT', `a band from ${lowHz} to ${asked} Hz can't be`);
  }
  const usable = USABLE_SHARE * sampleRateHz;
  if (lowHz >= usable)
    throw new DspInputError(
      'BAD_ARGUMENT',
      `a band from ${lowHz} Hz can't be at a rate of ${sampleRateHz} Hz`,
    );
  if (settings.bandHighHz !== undefined && asked > sampleRateHz / 2) {
    throw new DspInputError('BAD_ARGUMENT', `a band to ${asked} Hz can't be at a rate of ${sampleRateHz} Hz`);
  }
  const isCrowded = toneHz !== null && toneHz > CROWDED_SHARE * BAND_HIGH_HZ && usable > BAND_HIGH_HZ;
  const isNarrow = BAND_HIGH_HZ > sampleRateHz / 2;
  const highHz = settings.bandHighHz ?? (isCrowded || isNarrow ? usable : BAND_HIGH_HZ);
  // Judged by the band as it is, not by who chose it: the same analysis with its settings spelt out warns the same.
  const warnings: Warning[] = [];
  if (isNarrow && highHz >= usable) {
    warnings.push(
      makeWarning('band-cut', { rate: sampleRateHz, asked: BAND_HIGH_HZ, high: shortNumber(highHz) }),
    );
  } else if (isCrowded && highHz > BAND_HIGH_HZ) {
    warnings.push(makeWarning('band-widened', { frequency: shortNumber(toneHz), high: shortNumber(highHz) }));
  }
  if (highHz > DOUBTFUL_SHARE * sampleRateHz) {
    warnings.push(makeWarning('band-near-limit', { high: shortNumber(highHz), rate: sampleRateHz }));
  }
  return { lowHz, highHz, warnings };
}

/** A number in a sentence: six digits at most. */
export function shortNumber(value: number): string {
  return String(Number(value.toPrecision(6)));
}

/** A level in a sentence: one decimal. */
export function shortLevel(levelDb: number): string {
  return levelDb.toFixed(1);
}

/** Orders beyond this are no longer told from the next period's at any sensible rate. */
const HARMONICS_AT_MOST = 1000;

/** @throws DspInputError `BAD_ARGUMENT` unless it is a whole number from 2 to 1000 */
export function settleHighestHarmonic(settings: AnalysisSettings): number {
  const highest = settings.highestHarmonic ?? HIGHEST_HARMONIC;
  if (Number.isInteger(highest) && highest >= 2 && highest <= HARMONICS_AT_MOST) return highest;
  throw new DspInputError(
    'BAD_ARGUMENT',
    `harmonics up to the ${highest}. can't be: give 2 to ${HARMONICS_AT_MOST}`,
  );
}
