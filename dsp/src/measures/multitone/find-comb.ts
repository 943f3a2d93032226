import type { SampleSource } from '../../source/sample-source.js';
import { estimateTone } from '../../tone/estimate-tone.js';
import { fitSine } from '../../tone/fit-sine.js';
import type { FrameRange } from '../shared/stream-frames.js';

const LOOK_FRAMES = 262_144;
/** Clocks further apart than this are another stimulus's. */
const FURTHEST = 400e-6;
/** So many of the highest tones must be there. */
const LEAST_SHARE = 0.5;
const HIGHEST_SHARE_OF_RATE = 0.45;

/**
 * Reads the player's clock over the recorder's from the highest tones of a comb.
 *
 * @param frequenciesHz - as played
 * @returns null where the tones can't be seen
 */
export async function clockFromComb(
  source: SampleSource,
  range: FrameRange,
  frequenciesHz: readonly number[],
): Promise<number | null> {
  const { sampleRateHz } = source;
  const count = Math.min(LOOK_FRAMES, range.to - range.from);
  const block = await source.read(range.from + Math.floor((range.to - range.from - count) / 2), count);
  const high = frequenciesHz.filter((hz) => hz < HIGHEST_SHARE_OF_RATE * sampleRateHz).slice(-6);
  for (const samples of block) {
    const speeds = high.flatMap((hz): number[] => {
      const tone = estimateTone(samples, sampleRateHz, {
        lowHz: hz * (1 - 2 * FURTHEST),
        highHz: hz * (1 + 2 * FURTHEST),
      });
      if (tone === null) return [];
      const { frequencyHz } = fitSine(samples, sampleRateHz, tone.frequencyHz);
      return Math.abs(frequencyHz / hz - 1) < FURTHEST ? [frequencyHz / hz] : [];
    });
    if (speeds.length >= Math.max(2, LEAST_SHARE * high.length)) {
      speeds.sort((one, other) => one - other);
      return speeds[speeds.length >> 1];
    }
  }
  return null;
}
