import { lsbOf } from '../../level/quantisation.js';
import { PATTERN_FRAMES } from '../sections/pattern-section.js';
import { given, steadySpan, type Body, type BodyOptions } from './body.js';

/** Half of full scale: a tone of -3.01 dBFS. */
export const PATTERN_LEVEL_DBFS = 20 * Math.log10(Math.SQRT1_2);
/** A float file carries the pattern of 24 bits. */
const FLOAT_FILE_BITS = 24;

/** A quarter of the rate with the least bit switched 192 frames a period; exact to the bit. */
export function layOutJitterTest(options: BodyOptions): Body {
  const { sampleRateHz, bitsPerSample, cap } = options;
  const bits = bitsPerSample === '32f' ? FLOAT_FILE_BITS : bitsPerSample;
  const step = lsbOf(bits);
  const wanted = 0.5 * 10 ** ((cap(PATTERN_LEVEL_DBFS) - PATTERN_LEVEL_DBFS) / 20);
  const amplitude = Math.max(1, Math.round(wanted / step)) * step;
  const { frameCount, rampFrames, fromS, toS } = steadySpan(given(options.durationS), sampleRateHz);
  return {
    frameCount,
    sections: [{ kind: 'pattern', channels: 'both', fromFrame: 0, frameCount, rampFrames, amplitude, step }],
    parts: [
      {
        measure: 'jitter',
        channels: 'both',
        fromS,
        toS,
        parameters: { frequencyHz: sampleRateHz / 4, patternHz: sampleRateHz / PATTERN_FRAMES, bits },
        steps: [{ levelDbfs: 20 * Math.log10(amplitude * Math.SQRT2), fromS, toS }],
      },
    ],
    exact: [{ from: rampFrames, to: frameCount - rampFrames }],
  };
}
