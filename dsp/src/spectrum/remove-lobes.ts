import { localDensity } from './local-density.js';
import type { PowerSpectrum } from './power-spectrum.js';

export interface Lobe {
  readonly frequencyHz: number;
  /** Power of the line: its lobe less the noise density times its bins, FS²; noise alone can make it negative. */
  readonly power: number;
  /** Mean noise density of the neighbourhood, FS² per bin. */
  readonly noisePerBin: number;
  /** Bins of the lobe; 0 when the frequency isn't below half the sample rate. */
  readonly bins: number;
  /** Of `power` when there is only noise, FS²: a line is there when its power is twice this or more. */
  readonly standardDeviation: number;
}

export interface LobeRemoval {
  /** The spectrum with every lobe, that at 0 Hz too, refilled with the density of its neighbourhood. */
  readonly power: Float64Array;
  /** One a frequency, in the order asked. */
  readonly lobes: readonly Lobe[];
  /** The lobe at 0 Hz. */
  readonly constant: Lobe;
}

/** Gives each bin within reach of a centre to the nearest centre: -1 none, else the index. */
function assignBins(binCount: number, centres: readonly number[], halfWidth: number): Int32Array {
  const owner = new Int32Array(binCount).fill(-1);
  centres.forEach((centre, index) => {
    const from = Math.max(0, Math.ceil(centre - halfWidth));
    const to = Math.min(binCount - 1, Math.floor(centre + halfWidth));
    for (let k = from; k <= to; k++) {
      const other = owner[k];
      if (other < 0 || Math.abs(k - centre) < Math.abs(k - centres[other])) owner[k] = index;
    }
  });
  return owner;
}

/**
 * Takes lines out of a power spectrum and refills their places with the mean density of the neighbourhood.
 *
 * A bin belongs to a line when it is no farther from it than the window's exclusion half-width; where two lobes meet it
 * goes to the nearer line. The lobe at 0 Hz is always taken out.
 *
 * @param frequenciesHz - lines to take out, measured frequencies rather than nominal ones; those at or above half the
 *   sample rate give a lobe of 0 bins
 */
export function removeLobes(spectrum: PowerSpectrum, frequenciesHz: readonly number[]): LobeRemoval {
  const { binWidthHz, exclusionHalfWidthBins: halfWidth, effectiveAverages, binCorrelation } = spectrum;
  const power = spectrum.power.slice();
  const centres = [...frequenciesHz, 0].map((f) =>
    f < spectrum.sampleRateHz / 2 ? f / binWidthHz : Infinity,
  );
  const owner = assignBins(power.length, centres, halfWidth);
  const isTaken = new Uint8Array(owner.length);
  for (let k = 0; k < owner.length; k++) isTaken[k] = owner[k] < 0 ? 0 : 1;

  const lobes = centres.map((centre, index): Lobe => {
    const frequencyHz = index < frequenciesHz.length ? frequenciesHz[index] : 0;
    const first = Math.max(0, Math.ceil(centre - halfWidth));
    const last = Math.min(power.length - 1, Math.floor(centre + halfWidth));
    let bins = 0;
    let sum = 0;
    for (let k = first; k <= last; k++) {
      if (owner[k] !== index) continue;
      bins++;
      sum += spectrum.power[k];
    }
    if (bins === 0) return { frequencyHz, power: 0, noisePerBin: 0, bins: 0, standardDeviation: 0 };
    const density = localDensity(spectrum.power, isTaken, first, last, halfWidth, effectiveAverages);
    for (let k = first; k <= last; k++) {
      // Bin 0 and the last bin hold one side only.
      if (owner[k] === index)
        power[k] = k === 0 || k === power.length - 1 ? density.perBin / 2 : density.perBin;
    }
    const spread = bins + (density.bins > 0 ? (bins * bins) / density.bins : 0);
    return {
      frequencyHz,
      power: sum - density.perBin * bins,
      noisePerBin: density.perBin,
      bins,
      standardDeviation: density.perBin * Math.sqrt((binCorrelation / effectiveAverages) * spread),
    };
  });
  return { power, lobes: lobes.slice(0, -1), constant: lobes[lobes.length - 1] };
}
