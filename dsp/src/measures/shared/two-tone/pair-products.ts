import type { PowerSpectrum } from '../../../spectrum/power-spectrum.js';
import { removeLobes, type Lobe } from '../../../spectrum/remove-lobes.js';

/** Two tones as they lie in a recording. */
export interface TonePair {
  readonly lowHz: number;
  readonly highHz: number;
  /** Ratios of tones far apart are told as modulation of the high one, others as difference tones. */
  readonly kind: 'modulation' | 'difference';
}

/** A line at lowOrder · low + highOrder · high. */
export interface Product {
  readonly lowOrder: number;
  readonly highOrder: number;
  readonly frequencyHz: number;
  /** Peak value, FS; null where it stands in the noise. */
  readonly amplitude: number | null;
  /** Power it may have at most where it stands in the noise, FS². */
  readonly bound: number;
  /** Variance of its power, FS⁴. */
  readonly variance: number;
}

/** Sum of a pair of products against the reference amplitude. */
export interface ProductRatio {
  readonly ratio: number | null;
  /** Where `ratio` is null, it is below this. */
  readonly below: number;
  /** Relative standard uncertainty. */
  readonly relative: number;
}

export interface PairProducts {
  readonly lowPower: number;
  readonly highPower: number;
  readonly highVariance: number;
  readonly lowVariance: number;
  readonly products: readonly Product[];
  /** d_m2 or D2. */
  readonly second: ProductRatio;
  /** d_m3 or D3. */
  readonly third: ProductRatio;
  /** Root of the sum of both squares; what stands in the noise is left out. */
  readonly total: ProductRatio;
}

/** Products up to this order are listed. */
const HIGHEST_ORDER = 5;
/** A product below twice the scatter of the noise in its lobe is not told from it. */
const SIGNIFICANCE = 2;
/** Against the tones' power: below this the arithmetic itself is what shows. */
const ARITHMETIC_FLOOR = 1e-25;
const SAME_PLACE_HZ = 1e-3;

interface Place {
  readonly lowOrder: number;
  readonly highOrder: number;
  readonly frequencyHz: number;
}

/**
 * Takes the products of two tones out of a spectrum.
 *
 * Modulation: sums of a pair's two amplitudes at high ± n·low against the high tone. Difference: D2 is the line at
 * high - low, D3 the sum of those at 2·high - low and 2·low - high, against the sum of both tones.
 *
 * @param highestHz - products beyond it are left out
 * @see IEC 60268-3:2013, 14.12.7 and 14.12.8 (read in a transcription)
 */
export function measureProducts(spectrum: PowerSpectrum, pair: TonePair, highestHz: number): PairProducts {
  const { lowHz, highHz, kind } = pair;
  const places = listPlaces(spectrum, pair, highestHz);
  const { lobes } = removeLobes(spectrum, [lowHz, highHz, ...places.map(({ frequencyHz }) => frequencyHz)]);
  const [low, high] = lobes;
  const tones = Math.max(0, low.power) + Math.max(0, high.power);
  const products = places.map((place, index) => productOf(place, lobes[index + 2], tones));
  const amplitudeOf = (lobe: Lobe): number => Math.sqrt(2 * Math.max(0, lobe.power));
  const reference = kind === 'modulation' ? amplitudeOf(high) : amplitudeOf(low) + amplitudeOf(high);
  const pick = (...orders: (readonly [number, number])[]): Product[] =>
    products.filter(({ lowOrder, highOrder }) => orders.some(([l, h]) => l === lowOrder && h === highOrder));
  const isModulation = kind === 'modulation';
  const secondLines = isModulation ? pick([1, 1], [-1, 1]) : pick([-1, 1]);
  const thirdLines = isModulation ? pick([2, 1], [-2, 1]) : pick([-1, 2], [2, -1]);
  const second = ratioOf(secondLines, reference);
  const third = ratioOf(thirdLines, reference);
  return {
    lowPower: Math.max(0, low.power),
    highPower: Math.max(0, high.power),
    lowVariance: lineVariance(low, spectrum),
    highVariance: lineVariance(high, spectrum),
    products,
    second,
    third,
    total: combineRatios(second, third),
  };
}

/** Every sum and difference up to the fifth order, the lowest orders first; those that fall on another are left out. */
function listPlaces(spectrum: PowerSpectrum, { lowHz, highHz }: TonePair, highestHz: number): Place[] {
  const end = Math.min(
    highestHz,
    spectrum.sampleRateHz / 2 - spectrum.exclusionHalfWidthBins * spectrum.binWidthHz,
  );
  const places: Place[] = [];
  for (let order = 2; order <= HIGHEST_ORDER; order++) {
    for (let high = 0; high <= order; high++) {
      for (const low of high === order ? [0] : [order - high, high - order]) {
        const sum = low * lowHz + high * highHz;
        const place =
          sum >= 0
            ? { lowOrder: low, highOrder: high, frequencyHz: sum }
            : { lowOrder: -low, highOrder: -high, frequencyHz: -sum };
        const isTaken = [lowHz, highHz, ...places.map(({ frequencyHz }) => frequencyHz)].some(
          (other) => Math.abs(other - place.frequencyHz) < SAME_PLACE_HZ,
        );
        if (place.frequencyHz > SAME_PLACE_HZ && place.frequencyHz <= end && !isTaken) places.push(place);
      }
    }
  }
  return places;
}

function productOf(place: Place, lobe: Lobe, tones: number): Product {
  const isThere =
    lobe.power > tones * ARITHMETIC_FLOOR && lobe.power >= SIGNIFICANCE * lobe.standardDeviation;
  return {
    ...place,
    amplitude: isThere ? Math.sqrt(2 * lobe.power) : null,
    bound: SIGNIFICANCE * lobe.standardDeviation,
    variance: lobe.standardDeviation ** 2,
  };
}

function lineVariance(lobe: Lobe, spectrum: PowerSpectrum): number {
  // Noise in the lobe, and what it does to the line: 2 P S / T, as a tone's own.
  const worth = spectrum.effectiveAverages / spectrum.binCorrelation;
  return lobe.standardDeviation ** 2 + (2 * Math.max(0, lobe.power) * lobe.noisePerBin) / worth;
}

function ratioOf(lines: readonly Product[], reference: number): ProductRatio {
  const found = lines.filter(({ amplitude }) => amplitude !== null);
  const sum = found.reduce((total, { amplitude }) => total + (amplitude ?? 0), 0);
  const bound = lines.reduce((total, line) => total + Math.sqrt(2 * line.bound), 0);
  // An amplitude √(2P) moves by √(2P)/(2P) of its power's scatter.
  const variance = found.reduce((total, line) => total + line.variance / (2 * (line.amplitude ?? 1) ** 2), 0);
  const isKnown = found.length > 0 && reference > 0;
  return {
    ratio: isKnown ? sum / reference : null,
    below: reference > 0 ? bound / reference : 0,
    relative: isKnown && sum > 0 ? Math.sqrt(2 * variance) / sum : 0,
  };
}

function combineRatios(second: ProductRatio, third: ProductRatio): ProductRatio {
  const isNone = second.ratio === null && third.ratio === null;
  const ratio = isNone ? null : Math.hypot(second.ratio ?? 0, third.ratio ?? 0);
  const scatter = [second, third].reduce(
    (sum, part) => sum + ((part.ratio ?? 0) ** 2 * part.relative) ** 2,
    0,
  );
  return {
    ratio,
    below: Math.hypot(second.below, third.below),
    relative: ratio === null || ratio === 0 ? 0 : Math.sqrt(scatter) / ratio ** 2,
  };
}
