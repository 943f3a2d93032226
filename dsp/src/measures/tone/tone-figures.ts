import { crestFactorDb, meanSquareToDbfs, powerToDb, ratioToDb } from '../../level/decibel.js';
import { effectiveBits } from '../../level/quantisation.js';
import type { Figures } from '../../record/record.js';
import {
  bitsScale,
  inverseScale,
  levelScale,
  percentScale,
  type FigureScale,
} from '../shared/figure-scale.js';
import type { QuantisationFloor } from '../shared/quantisation-floor.js';
import type { ChannelScan } from '../shared/scan-segment.js';
import { percentDeviation, powerDeviationDb, type UncertaintyComponent } from '../shared/uncertainty.js';
import type { Distortion } from './distortion.js';

/** Every figure of the measure, in the contract's order. */
export const TONE_FIGURES = [
  'fundamentalFrequencyHz',
  'fundamentalLevelDbfs',
  'thdDb',
  'thdPercent',
  'thdPlusNoiseDb',
  'thdPlusNoisePercent',
  'sinadDb',
  'snrDb',
  'enobBits',
  'noiseDbfs',
  'noiseAWeightedDbfs',
  'noiseItu468RmsDbfs',
  'samplePeakDbfs',
  'truePeakDbtp',
  'crestFactorDb',
  'dcOffsetDbfs',
] as const;

/** A level or ratio in dB; null where there is nothing to state. */
function finite(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

function percentOf(levelDb: number | null): number | null {
  return levelDb === null ? null : 100 * 10 ** (levelDb / 20);
}

/** The figures of one channel that holds a tone. */
export function toneFigures(scan: ChannelScan, parts: Distortion): Figures {
  const { fundamental, residual, noise, harmonicPower } = parts;
  const thdDb = harmonicPower === null ? null : finite(powerToDb(harmonicPower / fundamental));
  const thdPlusNoiseDb = finite(powerToDb(residual.meanSquare / (fundamental + residual.meanSquare)));
  const sinadDb = finite(powerToDb(fundamental / residual.meanSquare));
  return {
    fundamentalFrequencyHz: parts.frequencyHz,
    fundamentalLevelDbfs: finite(meanSquareToDbfs(fundamental)),
    thdDb,
    thdPercent: percentOf(thdDb),
    thdPlusNoiseDb,
    thdPlusNoisePercent: percentOf(thdPlusNoiseDb),
    sinadDb,
    snrDb: finite(powerToDb(fundamental / noise.flat.meanSquare)),
    enobBits: sinadDb === null ? null : effectiveBits(sinadDb),
    noiseDbfs: finite(meanSquareToDbfs(noise.flat.meanSquare)),
    noiseAWeightedDbfs: finite(meanSquareToDbfs(noise.aWeighted.meanSquare)),
    noiseItu468RmsDbfs: finite(meanSquareToDbfs(noise.itu468Rms.meanSquare)),
    samplePeakDbfs: finite(ratioToDb(scan.level.samplePeak)),
    truePeakDbtp: finite(ratioToDb(scan.truePeak)),
    crestFactorDb: finite(crestFactorDb(scan.level.samplePeak, scan.level.meanSquare)),
    dcOffsetDbfs: finite(ratioToDb(Math.abs(scan.constant))),
  };
}

/** Figures that noise, distortion or the rig can limit. THD+N is a product where harmonics make up most of it. */
export function toneScales(parts: Distortion): FigureScale[] {
  const nature = (parts.harmonicPower ?? 0) > parts.residual.meanSquare / 2 ? 'product' : 'noise';
  return [
    levelScale('thdDb', 'product'),
    percentScale('thdPercent', 'product'),
    levelScale('thdPlusNoiseDb', nature),
    percentScale('thdPlusNoisePercent', nature),
    inverseScale('sinadDb', nature),
    inverseScale('snrDb', 'noise'),
    { ...bitsScale('enobBits'), nature },
    levelScale('noiseDbfs', 'noise'),
    levelScale('noiseAWeightedDbfs', 'noise'),
    levelScale('noiseItu468RmsDbfs', 'noise'),
  ];
}

/** Where an ideal quantiser's noise would put each figure, dB on the figure's scale. */
export function toneQuantisation(parts: Distortion, floor: QuantisationFloor | null): Record<string, number> {
  if (floor === null) return {};
  const { fundamental, residual } = parts;
  const againstTotal = powerToDb(floor.flat / (fundamental + residual.meanSquare));
  const againstTone = powerToDb(floor.flat / fundamental);
  return {
    thdPlusNoiseDb: againstTotal,
    thdPlusNoisePercent: againstTotal,
    sinadDb: againstTone,
    snrDb: againstTone,
    enobBits: againstTone,
    noiseDbfs: meanSquareToDbfs(floor.flat),
    noiseAWeightedDbfs: meanSquareToDbfs(floor.aWeighted),
    noiseItu468RmsDbfs: meanSquareToDbfs(floor.itu468Rms),
  };
}

/** What the finite recording leaves unsure of each figure. */
export function toneComponents(
  parts: Distortion,
  figures: Figures,
): Record<string, readonly UncertaintyComponent[]> {
  const { noise, residual } = parts;
  const level = powerDeviationDb(parts.fundamental, parts.fundamentalVariance);
  const thd = powerDeviationDb(parts.harmonicPower ?? 0, parts.harmonicVariance);
  const residualDb = powerDeviationDb(residual.meanSquare, noise.flat.variance + parts.harmonicVariance);
  const noiseDb = powerDeviationDb(noise.flat.meanSquare, noise.flat.variance);
  const estimate = (value: number): UncertaintyComponent[] => [{ name: 'estimate', value }];
  const ratio = (value: number): UncertaintyComponent[] => [
    ...estimate(value),
    { name: 'level', value: level },
  ];
  const percent = (key: string, components: readonly UncertaintyComponent[]): UncertaintyComponent[] => {
    const value = figures[key];
    return typeof value !== 'number'
      ? []
      : components.map((part) => ({ ...part, value: percentDeviation(value, part.value) }));
  };
  return {
    fundamentalFrequencyHz: [{ name: 'fit', value: parts.frequencyDeviationHz }],
    fundamentalLevelDbfs: estimate(level),
    thdDb: ratio(thd),
    thdPercent: percent('thdPercent', ratio(thd)),
    thdPlusNoiseDb: ratio(residualDb),
    thdPlusNoisePercent: percent('thdPlusNoisePercent', ratio(residualDb)),
    sinadDb: ratio(residualDb),
    snrDb: ratio(noiseDb),
    enobBits: ratio(residualDb).map((part) => ({ ...part, value: part.value / (20 * Math.log10(2)) })),
    noiseDbfs: estimate(noiseDb),
    noiseAWeightedDbfs: estimate(powerDeviationDb(noise.aWeighted.meanSquare, noise.aWeighted.variance)),
    noiseItu468RmsDbfs: estimate(powerDeviationDb(noise.itu468Rms.meanSquare, noise.itu468Rms.variance)),
  };
}
