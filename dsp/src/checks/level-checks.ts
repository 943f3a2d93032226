import enob from '../../../test-vectors/quantisation/enob.json' with { type: 'json' };
import quantisation from '../../../test-vectors/quantisation/quantisation.json' with { type: 'json' };
import truePeak from '../../../test-vectors/true-peak/true-peak.json' with { type: 'json' };
import levels from '../../../test-vectors/levels/levels.json' with { type: 'json' };
import { createLevelMeter } from '../level/create-level-meter.js';
import { createTruePeakMeter } from '../level/create-true-peak-meter.js';
import { crestFactorDb, meanSquareToDbfs, ratioToDb, voltsToDbu, voltsToDbv } from '../level/decibel.js';
import { effectiveBits, idealSnrDb } from '../level/quantisation.js';
import { sine, synthesise } from '../testing/signals.js';
import type { Check } from './check.js';

/** One second at 48 kHz: whole periods of every tone below. */
const LENGTH = 48_000;

function twoTones(first: number, second: number): Float64Array {
  return synthesise(LENGTH, LENGTH, [
    { frequencyHz: 750, amplitude: first, phaseRad: Math.PI / 2 },
    { frequencyHz: 7000, amplitude: second, phaseRad: Math.PI / 2 },
  ]);
}

/** In the order of the table's signals; the triangle has 48 samples a period, hence its tolerance. */
const WAVES: readonly { readonly make: () => Float64Array; readonly toleranceDb: number }[] = [
  { make: () => sine(LENGTH, LENGTH, 997, 1, Math.PI / 2), toleranceDb: 1e-6 },
  { make: () => Float64Array.from({ length: LENGTH }, (_, n) => (n % 48 < 24 ? 1 : -1)), toleranceDb: 1e-9 },
  {
    make: () => Float64Array.from({ length: LENGTH }, (_, n) => 1 - Math.abs(((n % 4800) - 2400) / 1200)),
    toleranceDb: 1e-5,
  },
  { make: () => twoTones(0.5, 0.5), toleranceDb: 1e-6 },
  { make: () => twoTones(0.8, 0.2), toleranceDb: 1e-6 },
  { make: () => new Float64Array(LENGTH).fill(1), toleranceDb: 1e-9 },
];

const waveChecks: readonly Check[] = levels.signals.flatMap(
  ({ signal, dBFSaes17, crestDb }, index): Check[] => {
    const { make, toleranceDb } = WAVES[index];
    const read = () => {
      const meter = createLevelMeter();
      meter.push(make());
      return meter.read();
    };
    return [
      {
        id: `level/${signal}`,
        source: 'AES17-2015, 3.12; mean squares of the waves by definition',
        expected: dBFSaes17,
        tolerance: toleranceDb,
        unit: 'dBFS',
        compute: () => meanSquareToDbfs(read().meanSquare),
      },
      {
        id: `crest/${signal}`,
        source: 'definition of the crest factor',
        expected: crestDb,
        tolerance: toleranceDb,
        unit: 'dB',
        compute: () => crestFactorDb(read().samplePeak, read().meanSquare),
      },
    ];
  },
);

const unitChecks: readonly Check[] = levels.rows.flatMap(({ name, vrms, dBV, dBu }): Check[] => [
  {
    id: `volts/${name}/dbv`,
    source: levels.source,
    expected: dBV,
    tolerance: 1e-9,
    unit: 'dBV',
    compute: () => voltsToDbv(vrms),
  },
  {
    id: `volts/${name}/dbu`,
    source: levels.source,
    expected: dBu,
    tolerance: 1e-9,
    unit: 'dBu',
    compute: () => voltsToDbu(vrms),
  },
]);

const quantisationChecks: readonly Check[] = quantisation.rows.flatMap((row) =>
  (
    [
      ['none', row.snrUnditheredDb],
      ['rectangular', row.snrRpdfDb],
      ['triangular', row.snrTpdfDb],
    ] as const
  ).map(([dither, expected]): Check => ({
    id: `quantisation/${row.bits}-bits/${dither}`,
    source: quantisation.source,
    expected,
    tolerance: 1e-9,
    unit: 'dB',
    compute: () => idealSnrDb(row.bits, dither),
  })),
);

const enobChecks: readonly Check[] = enob.rows.map(({ sinadDb, levelDbfs, enob: expected }) => ({
  id: `enob/${sinadDb}-db-at-${levelDbfs}-dbfs`,
  source: enob.source,
  expected,
  tolerance: 1e-9,
  unit: 'bits',
  compute: () => effectiveBits(sinadDb, levelDbfs),
}));

/** The table's tones: cycles a sample, phase, peak. */
const TRUE_PEAK_TONES = [
  { frequencyHz: 12_000, phaseDeg: 0, amplitude: 0.5 },
  { frequencyHz: 12_000, phaseDeg: 45, amplitude: 0.5 },
  { frequencyHz: 8000, phaseDeg: 60, amplitude: 0.5 },
  { frequencyHz: 6000, phaseDeg: 67.5, amplitude: 0.5 },
  { frequencyHz: 12_000, phaseDeg: 45, amplitude: Math.SQRT2 },
] as const;

const truePeakChecks: readonly Check[] = TRUE_PEAK_TONES.flatMap((tone, index): Check[] => {
  const row = truePeak.cases[index];
  const compute = (): number => {
    const samples = sine(LENGTH, LENGTH, tone.frequencyHz, tone.amplitude, (tone.phaseDeg * Math.PI) / 180);
    const meter = createTruePeakMeter(LENGTH);
    // Faded over 10 ms at both ends, as the table's source asks: the filter's start isn't part of the reading.
    meter.push(samples.map((value, n) => value * Math.min(1, n / 480, (LENGTH - 1 - n) / 480)));
    return ratioToDb(meter.read());
  };
  return [
    {
      id: `true-peak/${row.signal}/filter`,
      source: 'ITU-R BS.1770-5, Annex 2: reading of its 48 taps, computed from them',
      // The steady reading; a straight fade beside it moves it by less than the slope of 1/480 a sample.
      expected: Math.max(row.bs1770FirDbtp, row.samplePeakDbfs),
      tolerance: 0.01,
      unit: 'dBTP',
      compute,
    },
    {
      id: `true-peak/${row.signal}/tolerance`,
      // -0.4 to +0.2 dB: the middle of the allowed range and half its width.
      source: 'EBU Tech 3341 (2023), Table 1, cases 15 to 19',
      expected: row.continuousPeakDbtp - 0.1,
      tolerance: 0.3,
      unit: 'dBTP',
      compute,
    },
  ];
});

export const levelChecks: readonly Check[] = [
  ...waveChecks,
  ...unitChecks,
  ...quantisationChecks,
  ...enobChecks,
  ...truePeakChecks,
];
