import { given, type Body, type BodyOptions } from './body.js';
import { layLadder, scaleLadder, type Rung } from './ladder.js';

const STEP_S = 0.6;
/** Below this a step lasts longer: its tone stands in the noise. */
const DEEP_DBFS = -90;
const DEEP_STEP_S = 1.5;
const QUICK_STEP_S = 0.35;

/** Close where converters and output stages bend, 5 dB apart on the way down into the noise. */
const LEVELS_DBFS: readonly number[] = [
  ...[0, -0.5, -1, -1.5, -2, -2.5, -3],
  ...[-4, -5, -6, -7, -8, -9, -10, -12, -15],
  ...Array.from({ length: 21 }, (_, index) => -20 - 5 * index),
];
const QUICK_LEVELS_DBFS: readonly number[] = [0, -1, -2, -3, -6, -10, -20, -40, -60, -80, -90, -100];

function rungsOf(isQuick: boolean): readonly Rung[] {
  if (isQuick) return QUICK_LEVELS_DBFS.map((levelDbfs) => ({ levelDbfs, durationS: QUICK_STEP_S }));
  return LEVELS_DBFS.map((levelDbfs) => ({
    levelDbfs,
    durationS: levelDbfs < DEEP_DBFS ? DEEP_STEP_S : STEP_S,
  }));
}

/** One tone that goes down from the top in steps. */
export function layOutLevelSteps(options: BodyOptions): Body {
  const { sampleRateHz, cap, amplitudeOf, isQuick } = options;
  const frequencyHz = given(options.frequencyHz);
  const topDbfs = given(options.levelDbfs);
  const ladder = layLadder(scaleLadder(rungsOf(isQuick), topDbfs, cap), sampleRateHz);
  const steps = ladder.rungs.map(({ step }) => step);
  return {
    frameCount: ladder.frameCount,
    sections: ladder.rungs.map(({ levelDbfs, fromFrame, frameCount }) => ({
      kind: 'tone',
      channels: 'both',
      fromFrame,
      frameCount,
      originFrame: 0,
      phaseTurns: 0,
      rampFrames: ladder.rampFrames,
      frequencyHz,
      amplitude: amplitudeOf(levelDbfs),
    })),
    parts: [
      {
        measure: 'level-steps',
        channels: 'both',
        fromS: steps[0].fromS,
        toS: steps[steps.length - 1].toS,
        parameters: { frequencyHz, levelDbfs: steps[0].levelDbfs },
        steps,
      },
    ],
    exact: [],
  };
}
