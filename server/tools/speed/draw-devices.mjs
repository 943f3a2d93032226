// Practice devices drawn by seed from stated ranges: each with one fault above a stated limit, or without any.
import { createRandom } from '@benchlark/dsp';

/** Draws a value evenly, or evenly in its logarithm. */
function createDraw(seed) {
  const random = createRandom(seed);
  return {
    between: (low, high) => low + (high - low) * random(),
    log: (low, high) => low * (high / low) ** random(),
    pick: (choices) => choices[Math.floor(random() * choices.length)],
  };
}

/** What every unit and every rig has: none of it is a fault. */
function ordinary(draw) {
  return {
    before: [
      { kind: 'gain', channel: 'both', gainDb: draw.between(-9, -4) },
      { kind: 'polynomial', channel: 'both', coefficients: [1, draw.log(1e-6, 1e-5), draw.log(1e-6, 1e-5)] },
      { kind: 'filter', channel: 'both', type: 'high-pass', frequencyHz: draw.between(1, 6), order: 1 },
      { kind: 'gain', channel: 'right', gainDb: draw.between(-0.1, 0.1) },
      { kind: 'crosstalk', channel: 'both', levelDb: draw.between(-100, -75), slopeDbPerOctave: 6 },
    ],
    after: [
      { kind: 'clock', channel: 'both', ppm: draw.between(-150, 150) },
      { kind: 'noise', channel: 'both', levelDbfs: draw.between(-110, -99) },
      { kind: 'lead', channel: 'both', seconds: draw.between(0.2, 0.8) },
    ],
  };
}

const side = (draw) => draw.pick(['left', 'right', 'both']);

/** A clip of one half or both, given before the gain: the stage bends what the file holds. */
function clip(draw, halves) {
  const level = draw.between(0.5, 0.93);
  if (halves === 'both') return { positive: level, negative: level };
  return draw.pick([true, false]) ? { positive: level, negative: 2 } : { positive: 2, negative: level };
}

/** Each fault with the limit above which it must be named, in words, and the stage that makes it. */
export const FAULTS = {
  'one-sided-clipping': {
    limit: 'one half cut between -6 and -0.6 dBFS, hard or with a knee of up to 3 dB',
    first: (draw) =>
      draw.pick([true, false])
        ? { kind: 'clip', channel: side(draw), ...clip(draw, 'one') }
        : { kind: 'soft-clip', channel: side(draw), ...clip(draw, 'one'), kneeDb: draw.between(0.5, 3) },
  },
  'symmetric-clipping': {
    limit: 'both halves cut between -6 and -0.6 dBFS',
    first: (draw) => ({ kind: 'clip', channel: side(draw), ...clip(draw, 'both') }),
  },
  'level-compression': {
    limit: 'a cube of -0.02 to -0.1',
    first: (draw) => ({
      kind: 'polynomial',
      channel: side(draw),
      coefficients: [1, 0, -draw.log(0.02, 0.1)],
    }),
  },
  'crossover-distortion': {
    limit: 'a dead zone of 0.0005 to 0.005 of full scale',
    first: (draw) => ({ kind: 'dead-zone', channel: side(draw), width: draw.log(5e-4, 5e-3) }),
  },
  truncation: {
    limit: '16 or 15 bits without dither before a quieter output',
    first: (draw) => ({ kind: 'quantise', channel: side(draw), bits: draw.pick([15, 16]), dither: 'none' }),
    noiseDbfs: -114,
  },
  'mains-hum': {
    limit: 'hum of -85 to -60 dBFS',
    last: (draw) => {
      const level = draw.between(-85, -60);
      return {
        kind: 'hum',
        channel: side(draw),
        frequencyHz: draw.pick([50, 60]) * draw.between(0.999, 1.001),
        levelsDbfs: [level, level - draw.between(0, 12), level - draw.between(0, 20)],
      };
    },
  },
  'frame-noise': {
    limit: 'a line at 8 kHz of -95 to -70 dBFS',
    last: (draw) => ({
      kind: 'tone',
      channel: side(draw),
      frequencyHz: 8000,
      levelDbfs: draw.between(-95, -70),
    }),
  },
  jitter: {
    limit: '700 to 6000 ps peak to peak, 60 Hz to 2 kHz',
    last: (draw) => ({
      kind: 'jitter',
      channel: 'both',
      peakToPeakPs: draw.log(700, 6000),
      frequencyHz: draw.log(60, 2000),
    }),
  },
  'early-roll-off': {
    limit: '-3 dB at 8 to 14 kHz or at 30 to 100 Hz',
    last: (draw) =>
      draw.pick([true, false])
        ? {
            kind: 'filter',
            channel: side(draw),
            type: 'low-pass',
            frequencyHz: draw.log(8000, 14_000),
            order: 2,
          }
        : {
            kind: 'filter',
            channel: side(draw),
            type: 'high-pass',
            frequencyHz: draw.log(30, 100),
            order: 1,
          },
  },
  'inverted-polarity': {
    limit: 'one channel or both',
    last: (draw) => ({ kind: 'polarity', channel: draw.pick(['right', 'both']) }),
  },
  'joined-channels': {
    limit: '4 to 18 dB between the channels',
    last: (draw) => ({
      kind: 'crosstalk',
      channel: 'both',
      levelDb: draw.between(-18, -4),
      slopeDbPerOctave: 0,
    }),
    gainDb: -6,
  },
  'channel-imbalance': {
    limit: '0.8 to 4 dB',
    last: (draw) => ({ kind: 'gain', channel: draw.pick(['left', 'right']), gainDb: -draw.between(0.8, 4) }),
  },
  'dc-offset': {
    limit: '0.7 to 5 % of full scale',
    last: (draw) => ({
      kind: 'offset',
      channel: side(draw),
      value: draw.pick([-1, 1]) * draw.log(0.007, 0.05),
    }),
  },
};

/** A device with one fault, or without any. */
export function drawDevice(fault, seed) {
  const draw = createDraw(seed);
  const { before, after } = ordinary(draw);
  const stages = [...before];
  const made = fault === null ? null : FAULTS[fault];
  if (made?.gainDb !== undefined) stages.unshift({ kind: 'gain', channel: 'both', gainDb: made.gainDb });
  if (made?.first) stages.unshift(made.first(draw));
  if (made?.last) stages.push(made.last(draw));
  const quiet = made?.noiseDbfs;
  const rest = after.map((stage) =>
    stage.kind === 'noise' && quiet !== undefined ? { ...stage, levelDbfs: quiet } : stage,
  );
  return {
    schema: 'benchlark-device/1',
    name: fault ?? 'without a fault',
    sampleRateHz: null,
    seed: seed % 100_000,
    stages: [...stages, ...rest],
  };
}
