import { given, steadySpan, type Body, type BodyOptions } from './body.js';

const TONES_PER_DECADE = 10;
/** Of 1 kHz: the first third-octave, 19.95 Hz. */
const LOWEST_BAND = -17;
/** Share of the rate up to which there are tones. */
const HIGHEST_SHARE = 0.45;

/** Exact mid-frequencies of third-octave bands. @see IEC 61260-1:2014, base-ten system */
export function multitoneFrequencies(sampleRateHz: number): number[] {
  const highest = Math.floor(TONES_PER_DECADE * Math.log10((HIGHEST_SHARE * sampleRateHz) / 1000));
  return Array.from(
    { length: highest - LOWEST_BAND + 1 },
    (_, index) => 1000 * 10 ** ((LOWEST_BAND + index) / TONES_PER_DECADE),
  );
}

/** Tones a third of an octave apart, all at once. */
export function layOutMultitone(options: BodyOptions): Body {
  const { sampleRateHz, seed, amplitudeOf } = options;
  const levelDbfs = given(options.levelDbfs);
  const frequenciesHz = multitoneFrequencies(sampleRateHz);
  const { frameCount, rampFrames, fromS, toS } = steadySpan(given(options.durationS), sampleRateHz);
  return {
    frameCount,
    sections: [
      {
        kind: 'multitone',
        channels: 'both',
        fromFrame: 0,
        frameCount,
        rampFrames,
        frequenciesHz,
        peak: amplitudeOf(levelDbfs),
        seed,
      },
    ],
    parts: [
      {
        measure: 'multitone',
        channels: 'both',
        fromS,
        toS,
        parameters: {
          lowestHz: frequenciesHz[0],
          tonesPerDecade: TONES_PER_DECADE,
          toneCount: frequenciesHz.length,
          levelDbfs,
          seed,
        },
        steps: [{ levelDbfs, fromS, toS }],
      },
    ],
    exact: [],
  };
}
