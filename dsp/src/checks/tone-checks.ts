import { powerToDb, ratioToDb } from '../level/decibel.js';
import { createSpectrumAverager } from '../spectrum/create-spectrum-averager.js';
import { levelSpectrumDbfs } from '../spectrum/power-spectrum.js';
import { removeLobes } from '../spectrum/remove-lobes.js';
import { bendCosine, clipBothHalves, clipPositiveHalf, deadZone } from '../testing/closed-forms.js';
import { bend, clip, sineOfCycles, synthesise } from '../testing/signals.js';
import { estimateTone, findStrongestTone } from '../tone/estimate-tone.js';
import { fitSine } from '../tone/fit-sine.js';
import type { WindowName } from '../window/window-coefficients.js';
import type { Check } from './check.js';

const N = 65_536;

function spectrumOf(samples: Float64Array, windowName: WindowName) {
  const averager = createSpectrumAverager({
    sampleRateHz: samples.length,
    fftLength: samples.length,
    windowName,
    overlap: 0,
  });
  averager.push(samples);
  return averager.finish();
}

/** Level of harmonic `order` against the fundamental, dB, from the lobes of a spectrum. */
function harmonicDb(samples: Float64Array, cycles: number, order: number): number {
  const { lobes } = removeLobes(spectrumOf(samples, 'blackman-harris-7'), [cycles, cycles * order]);
  return powerToDb(lobes[1].power / lobes[0].power);
}

const OFF_BIN = { frequencyHz: 1361.37, amplitude: 0.8, phaseRad: 1.1 };

const fitChecks: readonly Check[] = (
  [
    ['frequency', OFF_BIN.frequencyHz, 'Hz', 1e-12 * OFF_BIN.frequencyHz, 'frequencyHz'],
    ['amplitude', OFF_BIN.amplitude, 'FS', 1e-12, 'amplitude'],
    ['phase', OFF_BIN.phaseRad, 'rad', 1e-9, 'phaseRad'],
    ['offset', 0.01, 'FS', 1e-12, 'offset'],
  ] as const
).map(([name, expected, unit, tolerance, key]) => ({
  id: `sine-fit/off-bin/${name}`,
  source: 'the synthesised tone itself; IEEE Std 1057 four-parameter fit is exact without noise',
  expected,
  tolerance,
  unit,
  compute: () => fitSine(synthesise(N, N, [OFF_BIN], 0.01), N, 1361)[key],
}));

const estimateChecks: readonly Check[] = [0, 0.13, 0.37, 0.5, 0.81].map((offset) => ({
  id: `tone-estimate/${offset}-bin`,
  source: 'the synthesised tone itself',
  expected: 1000 + offset,
  // Without noise the neighbours' ratio is exact; the side lobes of the image are 92 dB down.
  tolerance: 1e-4,
  unit: 'bins',
  compute: () => estimateTone(sineOfCycles(N, 1000 + offset, 0.5), N)?.frequencyHz ?? Number.NaN,
}));

const leakChecks: readonly Check[] = (
  [
    ['hann', 0.25, -32.4],
    ['blackman-harris-4', 0.25, -89.6],
    ['blackman-harris-7', 0.25, -164.4],
    ['hft248d', 0.25, -242.8],
  ] as const
).map(([name, offset, expected]) => ({
  id: `leakage/${name}/${offset}-bin`,
  source: 'power outside the main lobe of a tone off the bin, simulated with NumPy in double precision',
  expected,
  // As the simulation was rounded; a transform with poor twiddles misses the deepest by tens of dB.
  tolerance: 1,
  unit: 'dB',
  compute: () => {
    const { power, exclusionHalfWidthBins } = spectrumOf(sineOfCycles(N, 1361 + offset), name);
    let outside = 0;
    power.forEach((value, k) => {
      if (Math.abs(k - 1361 - offset) > exclusionHalfWidthBins && k > exclusionHalfWidthBins)
        outside += value;
    });
    return powerToDb(outside / 0.5);
  },
}));

const clockChecks: readonly Check[] = [0, 10, 100, 200].flatMap((ppm): Check[] => {
  const length = 262_144;
  const cycles = ((997 * length) / 48_000) * (1 + ppm * 1e-6);
  const compute = (order: number): number => {
    const samples = synthesise(length, length, [
      { frequencyHz: cycles, amplitude: 0.5 },
      { frequencyHz: 2 * cycles, amplitude: 0.5e-5, phaseRad: 1 },
      { frequencyHz: 3 * cycles, amplitude: 0.5e-5 * 0.3, phaseRad: 2 },
    ]);
    const found = findStrongestTone(spectrumOf(samples, 'blackman-harris-7'))?.frequencyHz ?? Number.NaN;
    return harmonicDb(samples, found, order);
  };
  return [2, 3].map((order) => ({
    id: `harmonic-${order}/clock-off-${ppm}-ppm`,
    source: 'the synthesised amplitudes: 1e-5 and 0.3e-5 of the fundamental',
    expected: order === 2 ? -100 : ratioToDb(0.3e-5),
    tolerance: 0.001,
    unit: 'dB',
    compute: () => compute(order),
  }));
});

const COSINE = sineOfCycles(N, 1361, 1, Math.PI / 2);
const SINE = sineOfCycles(N, 1361);

/** Whole cycles without a factor in common with N: what folds back misses the low harmonics. */
const bentChecks: readonly Check[] = [
  { id: 'polynomial/a2', of: bendCosine(1, [1e-3]), make: () => bend(COSINE, [1, 1e-3]), order: 2 },
  { id: 'polynomial/a3', of: bendCosine(1, [0, 1e-3]), make: () => bend(COSINE, [1, 0, 1e-3]), order: 3 },
  {
    id: 'polynomial/a5',
    of: bendCosine(0.5, [0, 0, 0, 0.1]),
    make: () =>
      bend(
        COSINE.map((x) => x / 2),
        [1, 0, 0, 0, 0.1],
      ),
    order: 5,
  },
  { id: 'clip-both/0.9', of: clipBothHalves(0.9, 10), make: () => clip(SINE, -0.9, 0.9), order: 3 },
  { id: 'clip-positive/0.9', of: clipPositiveHalf(0.9, 10), make: () => clip(COSINE, -1, 0.9), order: 2 },
  {
    id: 'dead-zone/0.05',
    of: deadZone(0.05, 10),
    make: () => SINE.map((x) => x - Math.min(0.05, Math.max(-0.05, x))),
    order: 3,
  },
].map(({ id, of, make, order }) => ({
  id: `harmonic-${order}/${id}`,
  source: 'Fourier coefficients of the curve in closed form',
  expected: ratioToDb(Math.abs(of.harmonics[order - 1] / of.harmonics[0])),
  // What folds back falls between the bins of the low harmonics but not outside their lobes.
  tolerance: 0.001,
  unit: 'dB',
  compute: () => harmonicDb(make(), 1361, order),
}));

const scalingChecks: readonly Check[] = [
  {
    id: 'spectrum/sine-level',
    source: 'scaling of the level spectrum: a sine of peak a reads 20 lg a',
    expected: ratioToDb(0.25),
    tolerance: 1e-9,
    unit: 'dBFS',
    compute: () => levelSpectrumDbfs(spectrumOf(sineOfCycles(4096, 300, 0.25), 'blackman-harris-7'))[300],
  },
  {
    id: 'spectrum/constant-level',
    source: 'scaling of the level spectrum: a constant a reads 20 lg a at 0 Hz',
    expected: ratioToDb(0.25),
    tolerance: 1e-9,
    unit: 'dBFS',
    compute: () => levelSpectrumDbfs(spectrumOf(new Float64Array(4096).fill(0.25), 'hft248d'))[0],
  },
];

export const toneChecks: readonly Check[] = [
  ...fitChecks,
  ...estimateChecks,
  ...leakChecks,
  ...clockChecks,
  ...bentChecks,
  ...scalingChecks,
];
