import { moveSection } from '../sections/section.js';
import { framesOf, given, type Body, type BodyOptions, type LayOutBody } from './body.js';
import { layOutIntersampleTone } from './intersample-body.js';
import { layOutJitterTest, PATTERN_LEVEL_DBFS } from './jitter-body.js';
import { layOutLevelSteps } from './level-steps-body.js';
import { layOutMultitone } from './multitone-body.js';
import { layOutWhiteNoise } from './noise-body.js';
import { DIFFERENCE_TONES_HZ, MODULATION_TONES_HZ, TONE_HZ } from './usual-tones.js';
import { layOutTwoTone, layOutTwoToneSteps } from './pair-body.js';
import { layOutSilence } from './silence-body.js';
import { layOutSeparation, layOutSweep } from './sweep-body.js';
import { layOutTone } from './tone-body.js';

interface ProgrammePart extends Partial<
  Pick<BodyOptions, 'frequencyHz' | 'lowFrequencyHz' | 'highFrequencyHz' | 'durationS'>
> {
  readonly layOut: LayOutBody;
  readonly levelDbfs: number;
}

/** Silence between parts: reverberation, mutes and filters settle. */
const GAP_S = 0.25;
const QUICK_GAP_S = 0.15;
const MODULATION_RATIO = 4;

const FULL: readonly ProgrammePart[] = [
  { layOut: layOutTone('tone'), levelDbfs: -1, frequencyHz: TONE_HZ, durationS: 5 },
  { layOut: layOutTone('dynamic-range'), levelDbfs: -60, frequencyHz: TONE_HZ, durationS: 6 },
  { layOut: layOutSilence, levelDbfs: 0, durationS: 6 },
  { layOut: layOutLevelSteps, levelDbfs: 0, frequencyHz: TONE_HZ },
  { layOut: layOutSweep, levelDbfs: -10, durationS: 8 },
  { layOut: layOutSeparation, levelDbfs: -10, durationS: 8 },
  { layOut: layOutTwoTone(MODULATION_RATIO), levelDbfs: -1, ...MODULATION_TONES_HZ, durationS: 3 },
  { layOut: layOutTwoTone(1), levelDbfs: -1, ...DIFFERENCE_TONES_HZ, durationS: 3 },
  { layOut: layOutTwoToneSteps(MODULATION_RATIO), levelDbfs: 0, ...MODULATION_TONES_HZ },
  { layOut: layOutTwoToneSteps(1), levelDbfs: 0, ...DIFFERENCE_TONES_HZ },
  { layOut: layOutMultitone, levelDbfs: -1, durationS: 5 },
  { layOut: layOutJitterTest, levelDbfs: PATTERN_LEVEL_DBFS, durationS: 5 },
  { layOut: layOutIntersampleTone, levelDbfs: 0, durationS: 2 },
  { layOut: layOutWhiteNoise, levelDbfs: -10, durationS: 7 },
];

const QUICK: readonly ProgrammePart[] = [
  { layOut: layOutTone('tone'), levelDbfs: -1, frequencyHz: TONE_HZ, durationS: 2 },
  { layOut: layOutTone('dynamic-range'), levelDbfs: -60, frequencyHz: TONE_HZ, durationS: 2 },
  { layOut: layOutSilence, levelDbfs: 0, durationS: 1.5 },
  { layOut: layOutLevelSteps, levelDbfs: 0, frequencyHz: TONE_HZ },
  { layOut: layOutSweep, levelDbfs: -10, durationS: 2.5 },
  { layOut: layOutSeparation, levelDbfs: -10, durationS: 2 },
  { layOut: layOutTwoTone(MODULATION_RATIO), levelDbfs: -1, ...MODULATION_TONES_HZ, durationS: 1 },
  { layOut: layOutTwoTone(1), levelDbfs: -1, ...DIFFERENCE_TONES_HZ, durationS: 1 },
  { layOut: layOutJitterTest, levelDbfs: PATTERN_LEVEL_DBFS, durationS: 2 },
];

/** One body after the other, each a part of the whole. The top level shifts every part but silence and the exact pattern. */
export function layOutProgramme(options: BodyOptions): Body {
  const { sampleRateHz, isQuick, cap } = options;
  const topDbfs = given(options.levelDbfs);
  const gapFrames = framesOf(isQuick ? QUICK_GAP_S : GAP_S, sampleRateHz);
  const bodies = (isQuick ? QUICK : FULL).map(({ layOut, levelDbfs, ...tones }) =>
    layOut({ ...options, durationS: null, ...tones, levelDbfs: cap(levelDbfs + topDbfs) }),
  );
  let at = 0;
  const placed = bodies.map((body) => {
    const fromFrame = at;
    at += body.frameCount + gapFrames;
    return { body, fromFrame };
  });
  return {
    frameCount: at - gapFrames,
    sections: placed.flatMap(({ body, fromFrame }) =>
      body.sections.map((section) => moveSection(section, fromFrame)),
    ),
    parts: placed.flatMap(({ body, fromFrame }) => moveParts(body.parts, fromFrame / sampleRateHz)),
    exact: placed.flatMap(({ body, fromFrame }) =>
      body.exact.map(({ from, to }) => ({ from: from + fromFrame, to: to + fromFrame })),
    ),
  };
}

/** Moves a body's parts to where the body lies. */
export function moveParts(parts: Body['parts'], byS: number): Body['parts'] {
  return parts.map((part) => ({
    ...part,
    fromS: part.fromS + byS,
    toS: part.toS + byS,
    steps: part.steps.map((step) => ({ ...step, fromS: step.fromS + byS, toS: step.toS + byS })),
  }));
}
