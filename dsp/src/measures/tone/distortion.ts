import type { Harmonic } from '../../record/record.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { removeLobes, type Lobe } from '../../spectrum/remove-lobes.js';
import type { Band } from '../shared/settings-band.js';
import { bandNoise, readNoise, type BandNoise, type NoiseReadings } from '../shared/band-noise.js';
import type { ToneTrack } from '../shared/tone-tracker.js';

/** A harmonic below twice the scatter of the noise in its lobe is not told from it. */
const SIGNIFICANCE = 2;
/** Against the fundamental, as power: below this the arithmetic itself is what shows. */
const ARITHMETIC_FLOOR = 1e-25;

/** A tone taken apart: itself, its harmonics, and the rest. Powers in FS². */
export interface Distortion {
  readonly frequencyHz: number;
  readonly fundamental: number;
  readonly fundamentalVariance: number;
  /** Standard uncertainty of the frequency by noise, Hz. */
  readonly frequencyDeviationHz: number;
  readonly harmonics: readonly Harmonic[];
  /** Sum of the harmonics that stand out of the noise; null when none does or none lies in the band. */
  readonly harmonicPower: number | null;
  readonly harmonicVariance: number;
  /** Bound of the sum where none stands out. */
  readonly harmonicBound: number;
  /** All in the band but the fundamental. */
  readonly residual: BandNoise;
  readonly residualReadings: NoiseReadings;
  /** All in the band but the fundamental and its harmonics. */
  readonly noise: NoiseReadings;
}

/**
 * Takes a spectrum apart into tone, harmonics and noise.
 *
 * @param highestHarmonic - last order that counts
 */
export function takeApart(
  spectrum: PowerSpectrum,
  track: Pick<ToneTrack, 'frequencyHz' | 'harmonics'>,
  band: Pick<Band, 'lowHz' | 'highHz'>,
  highestHarmonic: number,
): Distortion {
  const { frequencyHz } = track;
  const orders = harmonicOrders(spectrum, frequencyHz, band, highestHarmonic);
  const { lobes, power } = removeLobes(spectrum, [
    frequencyHz,
    ...orders.map((order) => order * frequencyHz),
  ]);
  const fundamental = Math.max(0, lobes[0].power);
  const isThere = (lobe: Lobe): boolean =>
    lobe.power > fundamental * ARITHMETIC_FLOOR && lobe.power >= SIGNIFICANCE * lobe.standardDeviation;
  const present = lobes.slice(1).filter(isThere);
  const residualPower = withLobesPut(spectrum, power, frequencyHz);
  return {
    frequencyHz,
    fundamental,
    fundamentalVariance: lineVariance(spectrum, lobes[0]),
    frequencyDeviationHz: frequencyDeviation(spectrum, lobes[0]),
    harmonics: orders.map((order, index) =>
      harmonicOf(order, lobes[index + 1], isThere(lobes[index + 1]), fundamental, track),
    ),
    harmonicPower: present.length > 0 ? present.reduce((sum, lobe) => sum + lobe.power, 0) : null,
    harmonicVariance: present.reduce((sum, lobe) => sum + lineVariance(spectrum, lobe), 0),
    harmonicBound: lobes.slice(1).reduce((sum, lobe) => sum + SIGNIFICANCE * lobe.standardDeviation, 0),
    residual: bandNoise(spectrum, residualPower, band),
    residualReadings: readNoise(spectrum, residualPower, band),
    noise: readNoise(spectrum, power, band),
  };
}

/** Orders 2 to the highest that lie in the band and whose lobes lie below half the rate. */
export function harmonicOrders(
  spectrum: Pick<PowerSpectrum, 'sampleRateHz' | 'binWidthHz' | 'exclusionHalfWidthBins'>,
  frequencyHz: number,
  band: Pick<Band, 'lowHz' | 'highHz'>,
  highestHarmonic: number,
): number[] {
  const end = Math.min(
    band.highHz,
    spectrum.sampleRateHz / 2 - spectrum.exclusionHalfWidthBins * spectrum.binWidthHz,
  );
  const orders: number[] = [];
  for (let order = 2; order <= highestHarmonic && order * frequencyHz <= end; order++) {
    if (order * frequencyHz >= band.lowHz) orders.push(order);
  }
  return orders;
}

/** The spectrum with the constant's and the fundamental's lobes refilled and all else as it is. */
function withLobesPut(spectrum: PowerSpectrum, refilled: Float64Array, frequencyHz: number): Float64Array {
  const half = spectrum.exclusionHalfWidthBins;
  const centre = frequencyHz / spectrum.binWidthHz;
  return spectrum.power.map((value, k) => (k <= half || Math.abs(k - centre) <= half ? refilled[k] : value));
}

function harmonicOf(
  order: number,
  lobe: Lobe,
  isThere: boolean,
  fundamental: number,
  track: Pick<ToneTrack, 'frequencyHz' | 'harmonics'>,
): Harmonic {
  const { re, im } = track.harmonics.at(order) ?? { re: 0, im: 0 };
  const degrees = (Math.atan2(im, re) * 180) / Math.PI;
  return {
    order,
    frequencyHz: order * track.frequencyHz,
    levelDbr: isThere ? 10 * Math.log10(lobe.power / fundamental) : null,
    phaseDeg: isThere ? (degrees <= -180 ? degrees + 360 : degrees) : null,
  };
}

/** Time that the averaged frames are worth, seconds. */
function worthS(spectrum: PowerSpectrum): number {
  return spectrum.effectiveAverages / (spectrum.binCorrelation * spectrum.binWidthHz);
}

/** Variance of a line's power: that of the noise in its lobe, and of what the noise does to the line, 2 P S / T. */
function lineVariance(spectrum: PowerSpectrum, lobe: Lobe): number {
  const density = lobe.noisePerBin / spectrum.binWidthHz;
  return lobe.standardDeviation ** 2 + (2 * Math.max(0, lobe.power) * density) / worthS(spectrum);
}

/**
 * Scatter of a tone's frequency in white noise of density S over time T: var ω = 12 S / (A² T³).
 *
 * @see The Cramér-Rao bound, as in IEEE Std 1057; over the window's worth in time, which makes it larger
 */
function frequencyDeviation(spectrum: PowerSpectrum, lobe: Lobe): number {
  const density = lobe.noisePerBin / spectrum.binWidthHz;
  const amplitudeSquared = 2 * Math.max(lobe.power, Number.MIN_VALUE);
  return Math.sqrt((12 * density) / (amplitudeSquared * worthS(spectrum) ** 3)) / (2 * Math.PI);
}
