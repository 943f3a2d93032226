import { powerToDb } from '../../level/decibel.js';
import type { Figures, Trace } from '../../record/record.js';
import { sumBand } from '../../spectrum/integrate-band.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import { bandNoise, type BandNoise } from '../shared/band-noise.js';
import type { Band } from '../shared/settings-band.js';
import { spectrumTrace } from '../shared/spectrum-trace.js';
import type { CombReading } from './read-comb.js';

export const COMB_FIGURES = ['noiseAndDistortionDb', 'flatnessDb'] as const;

const REFERENCE_HZ = 1000;
/** A tone this far below the comb's strongest isn't there, power. */
const ABSENT = 1e-9;
/** A comb has at least so many tones that are alike within this, power. */
const LEAST_TONES = 5;
const ALIKE = 1e-4;
/** … and holds this share of all there is. */
const LEAST_SHARE = 0.1;
const SIXTH_OCTAVE = 2 ** (1 / 6);

export interface CombResult {
  readonly figures: Figures;
  readonly traces: Readonly<Record<string, Trace>>;
  readonly rest: BandNoise;
  /** Sum of the tones, FS². */
  readonly tones: number;
}

/**
 * Turns a comb into response, and what stands between its tones into noise and distortion.
 *
 * What lies under a tone's own lobe is taken to be as what lies beside it. The trace gives, third-octave by third-octave,
 * what stands beside the tones against all tones together, as the figure does for the whole band.
 */
export function combResult(
  { spectrum, tones }: CombReading,
  frequenciesHz: readonly number[],
  band: Pick<Band, 'lowHz' | 'highHz'>,
): CombResult | null {
  const strongest = Math.max(0, ...tones);
  if (tones.filter((power) => power > ALIKE * strongest && power > 0).length < LEAST_TONES) return null;
  const total = tones.reduce((sum, power) => sum + power, 0);
  if (total < LEAST_SHARE * sumBand(spectrum, band.lowHz, spectrum.sampleRateHz / 2)) return null;
  const reference = nearestIndex(frequenciesHz, REFERENCE_HZ);
  const levels = frequenciesHz.flatMap((hz, index): [number, number][] =>
    tones[index] > ABSENT * strongest ? [[hz, powerToDb(tones[index] / tones[reference])]] : [],
  );
  const { power } = removeLobes(spectrum, frequenciesHz);
  const rest = bandNoise(spectrum, power, band);
  const inBand = levels.filter(([hz]) => hz >= band.lowHz * 0.99 && hz <= band.highHz);
  const values = inBand.map(([, level]) => level);
  const between = frequenciesHz.flatMap((hz): [number, number][] => {
    const highHz = hz * SIXTH_OCTAVE;
    if (highHz > spectrum.sampleRateHz / 2) return [];
    const level = powerToDb(sumBand(spectrum, hz / SIXTH_OCTAVE, highHz, { power }) / total);
    return Number.isFinite(level) ? [[hz, level]] : [];
  });
  const noiseDb = powerToDb(rest.meanSquare / total);
  return {
    figures: {
      noiseAndDistortionDb: Number.isFinite(noiseDb) ? noiseDb : null,
      flatnessDb: values.length > 1 ? (Math.max(...values) - Math.min(...values)) / 2 : null,
    },
    traces: {
      response: traceOf('dB', levels),
      noiseAndDistortion: traceOf('dB', between),
      spectrum: spectrumTrace(spectrum),
    },
    rest,
    tones: total,
  };
}

function nearestIndex(frequenciesHz: readonly number[], hz: number): number {
  const distances = frequenciesHz.map((other) => Math.abs(Math.log(other / hz)));
  return distances.indexOf(Math.min(...distances));
}

function traceOf(yUnit: string, points: readonly (readonly [number, number])[]): Trace {
  return {
    xUnit: 'Hz',
    yUnit,
    x: Float64Array.from(points, ([x]) => x),
    y: Float64Array.from(points, ([, y]) => y),
  };
}
