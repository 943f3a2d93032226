import { meanSquareToDbfs, ratioToDb } from '../../level/decibel.js';
import type { Component, Figures, FigureLimit } from '../../record/record.js';
import { levelScale, percentScale, type FigureScale } from '../shared/figure-scale.js';
import { bareLimit } from '../shared/limits.js';
import type { PairProducts, ProductRatio, TonePair } from '../shared/two-tone/pair-products.js';
import { percentDeviation, powerDeviationDb, type UncertaintyComponent } from '../shared/uncertainty.js';

const TONES = ['lowToneFrequencyHz', 'highToneFrequencyHz', 'lowToneLevelDbfs', 'highToneLevelDbfs'];
export const PAIR_FIGURES: Readonly<Record<TonePair['kind'], readonly string[]>> = {
  modulation: [...TONES, 'modulationDistortionDb', 'modulationDistortionPercent'],
  difference: [...TONES, 'differenceD2Db', 'differenceD3Db', 'differenceDistortionDb'],
};

const DB_PER_RELATIVE = 20 / Math.LN10;

/** Which ratio stands behind each figure. */
function ratiosOf(kind: TonePair['kind'], parts: PairProducts): Readonly<Record<string, ProductRatio>> {
  return kind === 'modulation'
    ? { modulationDistortionDb: parts.total, modulationDistortionPercent: parts.total }
    : {
        differenceD2Db: parts.second,
        differenceD3Db: parts.third,
        differenceDistortionDb: parts.total,
      };
}

function isPercent(key: string): boolean {
  return key.endsWith('Percent');
}

export function pairFigures(pair: TonePair, parts: PairProducts): Figures {
  const shown = (key: string, { ratio }: ProductRatio): number | null =>
    ratio === null ? null : isPercent(key) ? 100 * ratio : ratioToDb(ratio);
  return {
    lowToneFrequencyHz: pair.lowHz,
    highToneFrequencyHz: pair.highHz,
    lowToneLevelDbfs: meanSquareToDbfs(parts.lowPower),
    highToneLevelDbfs: meanSquareToDbfs(parts.highPower),
    ...Object.fromEntries(
      Object.entries(ratiosOf(pair.kind, parts)).map(([key, ratio]) => [key, shown(key, ratio)]),
    ),
  };
}

/** A ratio whose products stand in the noise is only bounded. */
export function pairLimits(kind: TonePair['kind'], parts: PairProducts): Record<string, FigureLimit> {
  return Object.fromEntries(
    Object.entries(ratiosOf(kind, parts)).flatMap(([key, { ratio, below }]): [string, FigureLimit][] =>
      ratio !== null || !(below > 0)
        ? []
        : [[key, bareLimit('noise', isPercent(key) ? 100 * below : ratioToDb(below))]],
    ),
  );
}

export function pairScales(kind: TonePair['kind'], parts: PairProducts): FigureScale[] {
  return Object.keys(ratiosOf(kind, parts)).map((key) =>
    isPercent(key) ? percentScale(key, 'product') : levelScale(key, 'product'),
  );
}

export function pairComponents(
  kind: TonePair['kind'],
  parts: PairProducts,
): Record<string, readonly UncertaintyComponent[]> {
  const level = (power: number, variance: number): UncertaintyComponent[] => [
    { name: 'estimate', value: powerDeviationDb(power, variance) },
  ];
  const ratios = Object.entries(ratiosOf(kind, parts)).flatMap(
    ([key, { ratio, relative }]): [string, UncertaintyComponent[]][] => {
      if (ratio === null) return [];
      const db = DB_PER_RELATIVE * relative;
      return [[key, [{ name: 'estimate', value: isPercent(key) ? percentDeviation(100 * ratio, db) : db }]]];
    },
  );
  return {
    lowToneLevelDbfs: level(parts.lowPower, parts.lowVariance),
    highToneLevelDbfs: level(parts.highPower, parts.highVariance),
    ...Object.fromEntries(ratios),
  };
}

/** The products that stand out of the noise, as a record lists them. */
export function pairComponentsList(pair: TonePair, parts: PairProducts): Component[] {
  const high = Math.sqrt(2 * parts.highPower);
  const reference = pair.kind === 'modulation' ? high : high + Math.sqrt(2 * parts.lowPower);
  return parts.products.flatMap(({ lowOrder, highOrder, frequencyHz, amplitude }): Component[] =>
    amplitude === null
      ? []
      : [
          {
            lowOrder,
            highOrder,
            frequencyHz,
            levelDbr: ratioToDb(amplitude / reference),
            levelDbfs: ratioToDb(amplitude),
          },
        ],
  );
}
