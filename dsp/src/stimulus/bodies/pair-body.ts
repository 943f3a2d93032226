import type { MeasureId } from '../../record/record.js';
import type { ToneSection } from '../sections/tone-section.js';
import { given, type Body, type BodyOptions, type LayOutBody } from './body.js';
import { layLadder, scaleLadder, type LaidRung, type Rung } from './ladder.js';

const STEP_LEVELS_DBFS: readonly number[] = [0, -1, -2, -3, -6, -10, -15, -20, -30, -40];
/** Products 60 Hz apart need longer to be told apart than those of 1 kHz. */
const WIDE_STEP_S = 0.7;
const CLOSE_STEP_S = 0.5;

interface PairLayout {
  readonly measure: MeasureId;
  /** Amplitude of the low tone over that of the high one. */
  readonly amplitudeRatio: number;
  readonly rungs: (options: BodyOptions) => readonly Rung[];
}

function layOutPair({ measure, amplitudeRatio, rungs }: PairLayout): LayOutBody {
  return (options): Body => {
    const { sampleRateHz, amplitudeOf } = options;
    const lowFrequencyHz = given(options.lowFrequencyHz);
    const highFrequencyHz = given(options.highFrequencyHz);
    const ladder = layLadder(rungs(options), sampleRateHz);
    const toneOf = ({ levelDbfs, fromFrame, frameCount }: LaidRung, frequencyHz: number, share: number) => ({
      kind: 'tone' as const,
      channels: 'both' as const,
      fromFrame,
      frameCount,
      originFrame: 0,
      phaseTurns: 0,
      rampFrames: ladder.rampFrames,
      frequencyHz,
      amplitude: share * amplitudeOf(levelDbfs),
    });
    const lowShare = amplitudeRatio / (amplitudeRatio + 1);
    const steps = ladder.rungs.map(({ step }) => step);
    return {
      frameCount: ladder.frameCount,
      sections: ladder.rungs.flatMap((rung): ToneSection[] => [
        toneOf(rung, lowFrequencyHz, lowShare),
        toneOf(rung, highFrequencyHz, 1 - lowShare),
      ]),
      parts: [
        {
          measure,
          channels: 'both',
          fromS: steps[0].fromS,
          toS: steps[steps.length - 1].toS,
          parameters: { lowFrequencyHz, highFrequencyHz, amplitudeRatio, levelDbfs: steps[0].levelDbfs },
          steps,
        },
      ],
      exact: [],
    };
  };
}

/** Two tones at one level; its peak is that of a sine of the level. */
export function layOutTwoTone(amplitudeRatio: number): LayOutBody {
  const rungs = ({ levelDbfs, durationS }: BodyOptions): Rung[] => [
    { levelDbfs: given(levelDbfs), durationS: given(durationS) },
  ];
  return layOutPair({ measure: 'two-tone', amplitudeRatio, rungs });
}

/** Two tones that go down from the top in steps. */
export function layOutTwoToneSteps(amplitudeRatio: number): LayOutBody {
  const durationS = amplitudeRatio === 1 ? CLOSE_STEP_S : WIDE_STEP_S;
  const rungs = ({ levelDbfs, cap }: BodyOptions) =>
    scaleLadder(
      STEP_LEVELS_DBFS.map((level) => ({ levelDbfs: level, durationS })),
      given(levelDbfs),
      cap,
    );
  return layOutPair({ measure: 'two-tone-steps', amplitudeRatio, rungs });
}
