import { given, steadySpan, type Body, type BodyOptions } from './body.js';

/** RMS of a level: that of a sine of the level. */
function rmsOf({ amplitudeOf, levelDbfs }: BodyOptions): number {
  return amplitudeOf(given(levelDbfs)) * Math.SQRT1_2;
}

/** White noise of uniform density, whose peak is √3 of its RMS. */
export function layOutWhiteNoise(options: BodyOptions): Body {
  const { sampleRateHz, seed } = options;
  const { frameCount, rampFrames, fromS, toS } = steadySpan(given(options.durationS), sampleRateHz);
  const levelDbfs = given(options.levelDbfs);
  const peak = Math.sqrt(3) * rmsOf(options);
  return {
    frameCount,
    sections: [{ kind: 'white-noise', channels: 'both', fromFrame: 0, frameCount, rampFrames, peak, seed }],
    parts: [
      {
        measure: 'filter',
        channels: 'both',
        fromS,
        toS,
        parameters: { levelDbfs },
        steps: [{ levelDbfs, fromS, toS }],
      },
    ],
    exact: [],
  };
}

/** Noise of equal power in every octave. */
export function layOutPinkNoise(options: BodyOptions): Body {
  const { sampleRateHz, seed } = options;
  const { frameCount, rampFrames, fromS, toS } = steadySpan(given(options.durationS), sampleRateHz);
  const levelDbfs = given(options.levelDbfs);
  return {
    frameCount,
    sections: [
      {
        kind: 'pink-noise',
        channels: 'both',
        fromFrame: 0,
        frameCount,
        rampFrames,
        rms: rmsOf(options),
        seed,
      },
    ],
    parts: [
      {
        measure: 'loudness',
        channels: 'both',
        fromS,
        toS,
        parameters: { levelDbfs },
        steps: [{ levelDbfs, fromS, toS }],
      },
    ],
    exact: [],
  };
}
