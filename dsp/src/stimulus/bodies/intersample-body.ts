import { given, type Body, type BodyOptions } from './body.js';
import { layLadder } from './ladder.js';

const DROP_DB = 6;
const PHASE_TURNS = 1 / 8;

/** A quarter of the rate whose samples all lie at ± the level while the wave between them goes 3.01 dB beyond. */
export function layOutIntersampleTone(options: BodyOptions): Body {
  const { sampleRateHz, amplitudeOf } = options;
  const topDbfs = given(options.levelDbfs);
  const durationS = given(options.durationS) / 2;
  const frequencyHz = sampleRateHz / 4;
  const rungs = [topDbfs, topDbfs - DROP_DB].map((levelDbfs) => ({ levelDbfs, durationS }));
  const ladder = layLadder(rungs, sampleRateHz);
  const steps = ladder.rungs.map(({ step }) => step);
  return {
    frameCount: ladder.frameCount,
    sections: ladder.rungs.map(({ levelDbfs, fromFrame, frameCount }) => ({
      kind: 'tone',
      channels: 'both',
      fromFrame,
      frameCount,
      originFrame: 0,
      phaseTurns: PHASE_TURNS,
      rampFrames: ladder.rampFrames,
      frequencyHz,
      amplitude: Math.SQRT2 * amplitudeOf(levelDbfs),
    })),
    parts: [
      {
        measure: 'intersample',
        channels: 'both',
        fromS: steps[0].fromS,
        toS: steps[1].toS,
        parameters: { frequencyHz, phaseDeg: 360 * PHASE_TURNS, levelDbfs: topDbfs },
        steps,
      },
    ],
    exact: [],
  };
}
