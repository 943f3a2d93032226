import type { StimulusChannels, StimulusPart } from '../descriptor.js';
import type { SweepSection } from '../sections/sweep-section.js';
import { planSweep, sweepDurationS } from '../sweep-signal.js';
import { framesOf, given, type Body, type BodyOptions } from './body.js';

const LOW_HZ = 8;
/** Of the rate; the fade at the end begins at 0.475 of it. */
const HIGH_SHARE = 0.49;
const FADES = { fadeInS: 0.15, fadeOutS: 0.03 };
/** Silence after a sweep, in which a chain rings out and the noise is seen. */
const TAIL_S = 0.6;

interface LaidSweep {
  readonly frameCount: number;
  readonly section: SweepSection;
  readonly part: StimulusPart;
}

function laySweep(options: BodyOptions, channels: StimulusChannels, fromFrame: number): LaidSweep {
  const { sampleRateHz, amplitudeOf } = options;
  const levelDbfs = given(options.levelDbfs);
  const sweep = planSweep(LOW_HZ, HIGH_SHARE * sampleRateHz, given(options.durationS), FADES);
  const durationS = sweepDurationS(sweep);
  const frameCount = Math.floor(durationS * sampleRateHz) + 1;
  const fromS = fromFrame / sampleRateHz;
  return {
    frameCount: frameCount + framesOf(TAIL_S, sampleRateHz),
    section: { kind: 'sweep', channels, fromFrame, frameCount, sweep, amplitude: amplitudeOf(levelDbfs) },
    part: {
      measure: channels === 'both' ? 'sweep' : 'separation',
      channels,
      fromS,
      toS: fromS + durationS,
      parameters: { ...sweep, levelDbfs },
      steps: [],
    },
  };
}

function bodyOf(sweeps: readonly LaidSweep[]): Body {
  return {
    frameCount: sweeps.reduce((sum, { frameCount }) => sum + frameCount, 0),
    sections: sweeps.map(({ section }) => section),
    parts: sweeps.map(({ part }) => part),
    exact: [],
  };
}

/** One sweep in both channels. */
export function layOutSweep(options: BodyOptions): Body {
  return bodyOf([laySweep(options, 'both', 0)]);
}

/** The sweep in left alone, then in right alone. */
export function layOutSeparation(options: BodyOptions): Body {
  const left = laySweep(options, 'left', 0);
  return bodyOf([left, laySweep(options, 'right', left.frameCount)]);
}
