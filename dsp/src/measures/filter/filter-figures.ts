import { makeWarning } from '../../record/make-warning.js';
import type { FigureLimit, Figures, Warning } from '../../record/record.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { shortNumber, type Band } from '../shared/settings-band.js';
import type { UncertaintyComponent } from '../shared/uncertainty.js';
import { bandMean, type NoiseResponse } from './noise-response.js';

export const FILTER_FIGURES = ['passBandRippleDb', 'minus3DbHighHz', 'imageRejectionDb'] as const;

const HALF_POWER_DB = -3;
const REFERENCE_HZ = 1000;
/** A recording shows the images where its rate is so many times the player's. */
const RATES_APART = 1.9;
/** Of the player's rate: the band whose mirror image about half of the rate is looked at. */
const IMAGED_LOW = 0.25;
const IMAGED_HIGH = 0.45;
const DB_PER_RELATIVE_POWER = 10 / Math.LN10;

export interface FilterFigures {
  readonly figures: Figures;
  readonly components: Record<string, readonly UncertaintyComponent[]>;
  readonly ownLimits: Record<string, FigureLimit>;
  readonly warnings: readonly Warning[];
}

interface FilterInputs {
  readonly channel: string;
  readonly spectrum: PowerSpectrum;
  readonly response: NoiseResponse;
  readonly band: Pick<Band, 'lowHz' | 'highHz'>;
  readonly playerRateHz: number | null;
}

export function filterFigures(inputs: FilterInputs): FilterFigures {
  const { channel, response } = inputs;
  const ripple = rippleOf(response, inputs.band);
  const edge = fallOf(response);
  const images = imagesOf(inputs);
  const isNoise = ripple !== null && ripple.spreadDb < 2 * ripple.noiseDb;
  const noiseLimit: FigureLimit | null =
    ripple === null
      ? null
      : {
          by: 'noise',
          floor: ripple.noiseDb,
          marginDb: ripple.spreadDb - ripple.noiseDb,
          low: 0,
          high: ripple.spreadDb,
          below: null,
        };
  const about = (figure: string) => ({ channel, figures: [figure] });
  return {
    figures: {
      passBandRippleDb: ripple?.spreadDb ?? null,
      minus3DbHighHz: edge?.hz ?? null,
      imageRejectionDb: images?.rejectionDb ?? null,
    },
    components: {
      passBandRippleDb: ripple === null ? [] : [{ name: 'noise', value: ripple.noiseDb / 2 }],
      minus3DbHighHz: edge === null ? [] : [{ name: 'noise', value: edge.deviationHz }],
      imageRejectionDb: images === null ? [] : [{ name: 'noise', value: images.deviationDb }],
    },
    ownLimits: isNoise && noiseLimit !== null ? { passBandRippleDb: noiseLimit } : {},
    warnings: [
      ...(isNoise
        ? [makeWarning('ripple-in-noise', { floor: ripple.noiseDb.toFixed(2) }, about('passBandRippleDb'))]
        : []),
      ...(edge === null ? [makeWarning('no-half-power-point', { channel }, about('minus3DbHighHz'))] : []),
      ...(images === null ? [imagesWarning(inputs)] : []),
    ],
  };
}

/** Range of the response in the band, and what noise alone makes of so many points: 2σ √(2 ln n), as Gaussian extremes. */
function rippleOf({ x, y, deviationDb }: NoiseResponse, { lowHz, highHz }: FilterInputs['band']) {
  let [least, greatest, squares, count] = [Infinity, -Infinity, 0, 0];
  for (let k = 0; k < x.length; k++) {
    // Ends come out of a power of the ratio: they may miss the band by a rounding.
    if (x[k] < lowHz * (1 - 1e-9) || x[k] > highHz * (1 + 1e-9)) continue;
    least = Math.min(least, y[k]);
    greatest = Math.max(greatest, y[k]);
    squares += deviationDb[k] ** 2;
    count++;
  }
  if (count < 2) return null;
  const noiseDb = 2 * Math.sqrt(squares / count) * Math.sqrt(2 * Math.log(count));
  return { spreadDb: greatest - least, noiseDb };
}

/** Where the response first falls by 3 dB above 1 kHz, linear in dB over log f. */
function fallOf({ x, y, deviationDb }: NoiseResponse): { hz: number; deviationHz: number } | null {
  for (let k = 1; k < x.length; k++) {
    if (x[k] < REFERENCE_HZ || y[k] > HALF_POWER_DB || y[k - 1] <= HALF_POWER_DB) continue;
    const share = (y[k - 1] - HALF_POWER_DB) / (y[k - 1] - y[k]);
    const slope = (y[k - 1] - y[k]) / (x[k] - x[k - 1]);
    return { hz: x[k - 1] * (x[k] / x[k - 1]) ** share, deviationHz: deviationDb[k] / slope };
  }
  return null;
}

/** Mean level of a band below half of the player's rate against that of its mirror image above. */
function imagesOf({ spectrum, playerRateHz }: FilterInputs) {
  if (playerRateHz === null || spectrum.sampleRateHz < RATES_APART * playerRateHz) return null;
  const played = bandMean(spectrum, IMAGED_LOW * playerRateHz, IMAGED_HIGH * playerRateHz);
  const image = bandMean(spectrum, (1 - IMAGED_HIGH) * playerRateHz, (1 - IMAGED_LOW) * playerRateHz);
  if (!(image.mean > 0 && played.mean > 0)) return null;
  return {
    rejectionDb: 10 * Math.log10(played.mean / image.mean),
    deviationDb: DB_PER_RELATIVE_POWER * Math.hypot(played.deviation, image.deviation),
  };
}

function imagesWarning({ channel, spectrum, playerRateHz }: FilterInputs): Warning {
  const player =
    playerRateHz === null ? 'the player’s rate, which is not known' : `${shortNumber(playerRateHz)} Hz`;
  return makeWarning(
    'images-out-of-reach',
    { rate: spectrum.sampleRateHz, player },
    { channel, figures: ['imageRejectionDb'] },
  );
}
