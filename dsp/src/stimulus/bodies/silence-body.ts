import { framesOf, given, type Body, type BodyOptions } from './body.js';

/** Nothing but zeros. */
export function layOutSilence({ sampleRateHz, durationS }: BodyOptions): Body {
  const frameCount = framesOf(given(durationS), sampleRateHz);
  const toS = frameCount / sampleRateHz;
  return {
    frameCount,
    sections: [],
    parts: [{ measure: 'idle', channels: 'both', fromS: 0, toS, parameters: {}, steps: [] }],
    exact: [],
  };
}
