import { given, steadySpan, type Body, type BodyOptions } from './body.js';

/** Share of the rate up to which the square has harmonics. */
const HIGHEST_SHARE = 0.45;

/** A square wave of its odd harmonics below 0.45 of the rate, 1/n each: none folds back. Its level is the RMS. */
export function layOutSquare(options: BodyOptions): Body {
  const { sampleRateHz, amplitudeOf } = options;
  const frequencyHz = given(options.frequencyHz);
  const levelDbfs = given(options.levelDbfs);
  const orders: number[] = [];
  for (let order = 1; order * frequencyHz <= HIGHEST_SHARE * sampleRateHz || order === 1; order += 2) {
    orders.push(order);
  }
  const root = Math.sqrt(orders.reduce((sum, order) => sum + 1 / (order * order), 0));
  const fundamental = amplitudeOf(levelDbfs) / root;
  const { frameCount, rampFrames, fromS, toS } = steadySpan(given(options.durationS), sampleRateHz);
  return {
    frameCount,
    sections: orders.map((order) => ({
      kind: 'tone',
      channels: 'both',
      fromFrame: 0,
      frameCount,
      originFrame: 0,
      phaseTurns: 0,
      rampFrames,
      frequencyHz: order * frequencyHz,
      amplitude: fundamental / order,
    })),
    parts: [
      {
        measure: 'tone',
        channels: 'both',
        fromS,
        toS,
        parameters: { frequencyHz, levelDbfs },
        steps: [{ levelDbfs, fromS, toS }],
      },
    ],
    exact: [],
  };
}
