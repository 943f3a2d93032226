import acz from '../../../test-vectors/weighting/a-c-z.json' with { type: 'json' };
import bs468 from '../../../test-vectors/weighting/bs468.json' with { type: 'json' };
import offsets from '../../../test-vectors/weighting/noise-offsets.json' with { type: 'json' };
import { powerToDb } from '../level/decibel.js';
import { createWeightingFactors, weightingDb, type WeightingName } from '../weighting/weighting-curves.js';
import type { Check } from './check.js';

/** Printed tables are rounded to 0.1 dB: half of that, and a rounding tie. */
const PRINTED_DB = 0.06;

const curveChecks: readonly Check[] = [
  ...acz.rows.flatMap(({ nominalHz, exactHz, A, C }): Check[] => [
    {
      id: `weighting/a/${nominalHz}-hz`,
      source: acz.source,
      expected: A,
      tolerance: PRINTED_DB,
      unit: 'dB',
      compute: () => weightingDb('a', exactHz),
    },
    {
      id: `weighting/c/${nominalHz}-hz`,
      source: acz.source,
      expected: C,
      tolerance: PRINTED_DB,
      unit: 'dB',
      compute: () => weightingDb('c', exactHz),
    },
  ]),
  ...bs468.rows.map(({ hz, db }): Check => ({
    id: `weighting/itu-468/${hz}-hz`,
    source: bs468.source,
    expected: db,
    tolerance: PRINTED_DB,
    unit: 'dB',
    compute: () => weightingDb('itu-468', hz),
  })),
  {
    id: 'weighting/itu-468-rms/2000-hz',
    source: 'AES17-2015, 5.2.7: unity gain at 2 kHz',
    expected: 0,
    // 5.63 is the curve's 5.629 rounded.
    tolerance: 0.001,
    unit: 'dB',
    compute: () => weightingDb('itu-468-rms', 2000),
  },
];

/** Reading of noise with power ~ f^slope, 20 Hz to 20 kHz, through a weighting, against unweighted. */
function noiseOffsetDb(name: WeightingName, slope: number): number {
  const binWidthHz = 0.5;
  const factors = createWeightingFactors(name, 40_001, binWidthHz);
  let weighted = 0;
  let plain = 0;
  for (let k = 40; k <= 40_000; k++) {
    // The trapezium's ends count half.
    const share = (k === 40 || k === 40_000 ? 0.5 : 1) * (k * binWidthHz) ** slope;
    weighted += share * factors[k];
    plain += share;
  }
  return powerToDb(weighted / plain);
}

const OFFSETS = [
  { name: 'a', row: offsets.offsets.A },
  { name: 'c', row: offsets.offsets.C },
  { name: 'itu-468', row: offsets.offsets.BS468 },
  { name: 'itu-468-rms', row: offsets.offsets['CCIR-RMS'] },
] as const;

const noiseChecks: readonly Check[] = OFFSETS.flatMap(({ name, row }): Check[] => [
  {
    id: `weighting/${name}/white-noise`,
    source: offsets.source,
    expected: row.white20to20k,
    tolerance: 0.001,
    unit: 'dB',
    compute: () => noiseOffsetDb(name, 0),
  },
  {
    id: `weighting/${name}/pink-noise`,
    source: offsets.source,
    expected: row.pink20to20k,
    tolerance: 0.001,
    unit: 'dB',
    compute: () => noiseOffsetDb(name, -1),
  },
]);

export const weightingChecks: readonly Check[] = [...curveChecks, ...noiseChecks];
