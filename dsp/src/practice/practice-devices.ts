import { DEVICE_SCHEMA, type PracticeDevice, type PracticeStage } from './device.js';

/** Puts an interface's noise behind the stages, a recorder that runs longer than the player, and its own faults last. */
function build(
  name: string,
  seed: number,
  stages: readonly PracticeStage[],
  recorder: readonly PracticeStage[] = [],
): PracticeDevice {
  return {
    schema: DEVICE_SCHEMA,
    name,
    sampleRateHz: null,
    seed,
    stages: [
      ...stages,
      { kind: 'noise', channel: 'both', levelDbfs: -112 },
      { kind: 'lead', channel: 'both', seconds: 0.5 },
      ...recorder,
    ],
  };
}

/**
 * A converter whose bass falls below 31 Hz and whose noise hides what lies under about -100 dBFS, as inexpensive ones have
 * it (common practice, no source).
 */
const PLAIN_CONVERTER: readonly PracticeStage[] = [
  { kind: 'filter', channel: 'both', type: 'high-pass', frequencyHz: 9, order: 1 },
  { kind: 'noise', channel: 'both', levelDbfs: -97 },
];

/** Invented devices to practise on, by the name that a person types. */
export const PRACTICE_DEVICES: Readonly<Record<string, PracticeDevice>> = {
  clean: build('a unit without a fault', 101, [
    { kind: 'gain', channel: 'both', gainDb: -1.5 },
    { kind: 'polynomial', channel: 'both', coefficients: [1, 4e-6, 2e-6] },
  ]),
  'plain-converter': build('an inexpensive converter without a fault', 107, [...PLAIN_CONVERTER]),
  'pinched-converter': build(
    'the same converter, its output held at 0.763 on one half of the left channel',
    108,
    [...PLAIN_CONVERTER, { kind: 'clip', channel: 'left', positive: 0.763, negative: 2 }],
  ),
  'yielding-converter': build(
    'the same converter, its output giving way softly on one half of the left channel',
    109,
    [...PLAIN_CONVERTER, { kind: 'soft-clip', channel: 'left', positive: 0.8, negative: 2, kneeDb: 2 }],
  ),
  'mended-converter': build('the same converter after its output stage was mended', 110, [
    ...PLAIN_CONVERTER,
  ]),
  'humming-headphone-amplifier': build('a headphone amplifier with hum on its right channel', 102, [
    { kind: 'gain', channel: 'both', gainDb: -2 },
    { kind: 'polynomial', channel: 'both', coefficients: [1, 2e-5, 8e-6] },
    { kind: 'hum', channel: 'right', frequencyHz: 50, levelsDbfs: [-84, -78, -97, -86, -105, -94] },
  ]),
  'bruised-line-stage': build('a line stage that flattens the positive half on its left channel', 103, [
    { kind: 'soft-clip', channel: 'left', positive: 0.72, negative: 1.4, kneeDb: 1.5 },
    { kind: 'crosstalk', channel: 'both', levelDb: -82, slopeDbPerOctave: 6 },
  ]),
  'cold-output-stage': build('an output stage without standing current', 104, [
    { kind: 'dead-zone', channel: 'both', width: 4e-4 },
    { kind: 'gain', channel: 'both', gainDb: -0.8 },
  ]),
  'restless-converter': build('a converter with a fast, unsteady clock', 105, [
    { kind: 'clock', channel: 'both', ppm: 38 },
    { kind: 'jitter', channel: 'both', peakToPeakPs: 2400, frequencyHz: 180 },
    { kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 19_000, order: 3 },
  ]),
  'tired-recorder': build(
    'a recorder of 16 bits that inverts and drifts off zero',
    106,
    [],
    [
      { kind: 'polarity', channel: 'both' },
      { kind: 'offset', channel: 'left', value: 0.004 },
      { kind: 'quantise', channel: 'both', bits: 16, dither: 'none' },
    ],
  ),
};
