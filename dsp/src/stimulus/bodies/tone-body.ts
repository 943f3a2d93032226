import type { MeasureId } from '../../record/record.js';
import { given, steadySpan, type LayOutBody } from './body.js';

/** One tone at one level. */
export function layOutTone(measure: MeasureId): LayOutBody {
  return (options) => {
    const { sampleRateHz, amplitudeOf } = options;
    const frequencyHz = given(options.frequencyHz);
    const levelDbfs = given(options.levelDbfs);
    const { frameCount, rampFrames, fromS, toS } = steadySpan(given(options.durationS), sampleRateHz);
    return {
      frameCount,
      sections: [
        {
          kind: 'tone',
          channels: 'both',
          fromFrame: 0,
          originFrame: 0,
          frameCount,
          rampFrames,
          frequencyHz,
          phaseTurns: 0,
          amplitude: amplitudeOf(levelDbfs),
        },
      ],
      parts: [
        {
          measure,
          channels: 'both',
          fromS,
          toS,
          parameters: { frequencyHz, levelDbfs },
          steps: [{ levelDbfs, fromS, toS }],
        },
      ],
      exact: [],
    };
  };
}
