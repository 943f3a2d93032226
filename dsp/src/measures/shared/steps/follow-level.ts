import type { SampleSource } from '../../../source/sample-source.js';
import { estimateTone } from '../../../tone/estimate-tone.js';
import type { AnalysisContext } from '../../measure.js';
import { streamFrames } from '../stream-frames.js';

/** A tone's level through a recording, block by block. */
export interface LevelEnvelope {
  readonly blockS: number;
  readonly frequencyHz: number;
  /** dBFS; the tone in the strongest channel. */
  readonly levelsDb: Float64Array;
}

const BLOCK_S = 0.01;
/** A block holds at least so many periods of the tone. */
const LEAST_PERIODS = 2;
const LOOK_FRAMES = 65_536;
const NEAR_NOMINAL = 0.02;
const FLOOR_DB = -160;

/**
 * Follows a tone's level where nothing says where it lies: noise and hum beside it count little.
 *
 * @param nominalHz - the tone; null for the strongest there is in the loudest stretch
 * @returns null when the recording is too short or holds no tone
 */
export async function followLevel(
  source: SampleSource,
  nominalHz: number | null,
  context: Pick<AnalysisContext, 'signal'>,
): Promise<LevelEnvelope | null> {
  const { sampleRateHz, frameCount, channelCount } = source;
  const loudest = await findLoudest(source, context);
  if (loudest === null) return null;
  const samples = (await source.read(loudest.from, Math.min(LOOK_FRAMES, frameCount - loudest.from)))[
    loudest.channel
  ];
  const tone = estimateTone(
    samples,
    sampleRateHz,
    nominalHz === null
      ? {}
      : { lowHz: nominalHz * (1 - NEAR_NOMINAL), highHz: nominalHz * (1 + NEAR_NOMINAL) },
  );
  if (tone === null || channelCount === 0) return null;
  const blockS = Math.max(BLOCK_S, LEAST_PERIODS / Math.max(1, tone.frequencyHz));
  const blockFrames = Math.max(1, Math.round(blockS * sampleRateHz));
  const blocks = new Float64Array(Math.floor(frameCount / blockFrames));
  const turn = (2 * Math.PI * tone.frequencyHz) / sampleRateHz;
  const [stepRe, stepIm] = [Math.cos(turn), Math.sin(turn)];
  let frame = 0;
  let [re, im] = [1, 0];
  let [sumRe, sumIm] = [0, 0];
  await streamFrames(source, { from: 0, to: blocks.length * blockFrames }, context, (channels) => {
    for (const x of channels[loudest.channel]) {
      sumRe += x * re;
      sumIm += x * im;
      const next = re * stepRe - im * stepIm;
      im = re * stepIm + im * stepRe;
      re = next;
      frame++;
      if (frame % blockFrames === 0) {
        const power = (2 * (sumRe * sumRe + sumIm * sumIm)) / (blockFrames * blockFrames);
        blocks[frame / blockFrames - 1] = Math.max(FLOOR_DB, 10 * Math.log10(2 * power));
        [sumRe, sumIm] = [0, 0];
        const size = Math.hypot(re, im); // rounding must not grow over a long recording
        [re, im] = [re / size, im / size];
      }
    }
  });
  return { blockS: blockFrames / sampleRateHz, frequencyHz: tone.frequencyHz, levelsDb: blocks };
}

/** The stretch and channel with the greatest power. */
async function findLoudest(
  source: SampleSource,
  context: Pick<AnalysisContext, 'signal'>,
): Promise<{ from: number; channel: number } | null> {
  let best: { from: number; channel: number; power: number } | null = null;
  let at = 0;
  await streamFrames(source, { from: 0, to: source.frameCount }, context, (channels) => {
    channels.forEach((samples, channel) => {
      let power = 0;
      for (const x of samples) power += x * x;
      if (power > (best?.power ?? 0)) best = { from: at, channel, power };
    });
    at += channels[0].length;
  });
  return best;
}
