import type { Component, Figures, FigureLimit, Trace } from '../../record/record.js';
import { powerToDb, ratioToDb } from '../../level/decibel.js';
import { removeLobes } from '../../spectrum/remove-lobes.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import { lineThreshold } from '../shared/find-spurs.js';
import { bareLimit } from '../shared/limits.js';
import type { UncertaintyComponent } from '../shared/uncertainty.js';
import { REACH_HZ } from './find-pairs.js';
import { isOwnPair, type PatternLines } from './pattern-lines.js';
import type { SidebandPair } from './read-sidebands.js';

export const JITTER_FIGURES = ['jitterPeakToPeakPs', 'jitterRmsPs'] as const;

const PS_PER_S = 1e12;
/** A pair is all of one kind when that has so many times the power of the other. */
const ONE_KIND = 10;
/** Half of peak to peak over root two: a sine's RMS. */
const PEAK_TO_PEAK_PER_RMS = 2 * Math.SQRT2;

export interface JitterResult {
  readonly figures: Figures;
  readonly components: readonly Component[];
  readonly limits: Readonly<Record<string, FigureLimit>>;
  readonly uncertainty: Readonly<Record<string, readonly UncertaintyComponent[]>>;
}

/** Peak-to-peak time, ps, that a pair of sidebands of a ratio to the tone means. */
function peakToPeakPs(ratio: number, toneHz: number): number {
  return ((2 * ratio) / (Math.PI * toneHz)) * PS_PER_S;
}

/**
 * Turns pairs into jitter: each sideband is π f J of the tone (index of modulation 2π f J), pairs add up as squares.
 *
 * @param own - lines that a perfect clock would leave too
 */
export function jitterResult(
  spectrum: PowerSpectrum,
  toneHz: number,
  pairs: readonly SidebandPair[],
  own: readonly PatternLines[],
): JitterResult {
  const toleranceHz = 1.5 * spectrum.binWidthHz;
  const foreign = pairs.filter(
    ({ offsetHz, phase, amplitude }) =>
      !isOwnPair(own, offsetHz, toneHz, Math.hypot(phase, amplitude), toleranceHz),
  );
  const kinds = foreign.map((pair) => ({ ...pair, kind: kindOf(pair) }));
  const moving = kinds.filter(({ kind }) => kind !== 'amplitude');
  const total = Math.hypot(...moving.map(({ phase }) => phase));
  const peakToPeak = moving.length > 0 ? peakToPeakPs(total, toneHz) : null;
  const noise = noiseRatio(spectrum, toneHz);
  const below = peakToPeakPs(Math.sqrt(noise * lineThreshold(spectrum.effectiveAverages)), toneHz);
  const isBounded = peakToPeak === null && below > 0;
  // Noise moves an amplitude by the root of half its power; pairs are read on both sides.
  const relative = total > 0 ? Math.sqrt(noise / (2 * spectrum.effectiveAverages)) / total : 0;
  return {
    figures: {
      jitterPeakToPeakPs: peakToPeak,
      jitterRmsPs: peakToPeak === null ? null : peakToPeak / PEAK_TO_PEAK_PER_RMS,
    },
    components: kinds.map(({ offsetHz, phase, amplitude, kind }) => ({
      offsetHz,
      levelDbr: ratioToDb(
        kind === 'phase' ? phase : kind === 'amplitude' ? amplitude : Math.hypot(phase, amplitude),
      ),
      kind,
    })),
    limits: isBounded
      ? {
          jitterPeakToPeakPs: bareLimit('noise', below),
          jitterRmsPs: bareLimit('noise', below / PEAK_TO_PEAK_PER_RMS),
        }
      : {},
    uncertainty:
      peakToPeak === null
        ? {}
        : {
            jitterPeakToPeakPs: [{ name: 'estimate', value: peakToPeak * relative }],
            jitterRmsPs: [{ name: 'estimate', value: (peakToPeak / PEAK_TO_PEAK_PER_RMS) * relative }],
          },
  };
}

function kindOf({ phase, amplitude }: SidebandPair): 'phase' | 'amplitude' | 'mixed' {
  if (phase ** 2 > ONE_KIND * amplitude ** 2) return 'phase';
  return amplitude ** 2 > ONE_KIND * phase ** 2 ? 'amplitude' : 'mixed';
}

/** Mean noise a bin around the tone, against the tone's power. */
function noiseRatio(spectrum: PowerSpectrum, toneHz: number): number {
  const [lobe] = removeLobes(spectrum, [toneHz]).lobes;
  return lobe.power > 0 ? lobe.noisePerBin / lobe.power : 0;
}

/** The spectrum around the tone, against it: distance from the tone and level of each bin. */
export function closeInTrace(spectrum: PowerSpectrum, toneHz: number): Trace {
  const { binWidthHz, power } = spectrum;
  const [lobe] = removeLobes(spectrum, [toneHz]).lobes;
  const first = Math.max(0, Math.ceil((toneHz - REACH_HZ) / binWidthHz));
  const last = Math.min(power.length - 1, Math.floor((toneHz + REACH_HZ) / binWidthHz));
  // A line reads its level in its highest bin: power in a bin is spread over the window's noise bandwidth.
  const scale = spectrum.enbwBins / Math.max(lobe.power, Number.MIN_VALUE);
  const x: number[] = [];
  const y: number[] = [];
  for (let k = first; k <= last; k++) {
    const level = powerToDb(power[k] * scale);
    if (!Number.isFinite(level)) continue;
    x.push(k * binWidthHz - toneHz);
    y.push(level);
  }
  return { xUnit: 'Hz', yUnit: 'dBr', x: Float64Array.from(x), y: Float64Array.from(y) };
}
