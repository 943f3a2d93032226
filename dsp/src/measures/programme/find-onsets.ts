import type { SampleSource } from '../../source/sample-source.js';
import type { AlignedPart } from '../shared/align-stimulus.js';

/** Parts that begin loud after a silence; the others' beginnings can't be seen. */
const LOUD_ONSETS = new Set([
  'tone',
  'level-steps',
  'two-tone',
  'two-tone-steps',
  'multitone',
  'jitter',
  'filter',
]);
/** As far as a beginning is looked for: the silence before a part and the part's own first moments. */
const LOOK_S = 0.12;
const BLOCK_S = 0.001;
const RAMP_S = 0.02;
/** What is loud must stand this far above the quiet, power. */
const LEAST_RISE = 100;

/**
 * Finds by its rise in level where a part really begins.
 *
 * @returns seconds by which it begins later than thought; null where its beginning can't be seen
 */
export async function onsetError(source: SampleSource, part: AlignedPart): Promise<number | null> {
  if (!LOUD_ONSETS.has(part.measure)) return null;
  const { sampleRateHz, frameCount } = source;
  const beginS = part.fromS - RAMP_S;
  const from = Math.round((beginS - LOOK_S) * sampleRateHz);
  const count = Math.round(2 * LOOK_S * sampleRateHz);
  if (from < 0 || from + count > frameCount) return null;
  const channels = await source.read(from, count);
  const blockFrames = Math.max(1, Math.round(BLOCK_S * sampleRateHz));
  const levels = Array.from({ length: Math.floor(count / blockFrames) }, (_, block) =>
    channels.reduce((sum, samples) => sum + meanSquare(samples, block * blockFrames, blockFrames), 0),
  );
  const loud = Math.max(...levels.slice(-10));
  const quiet = Math.min(...levels);
  if (!(loud > LEAST_RISE * quiet)) return null;
  // The ramp passes half of its amplitude in its middle; sums over a millisecond blur a low tone's own wave.
  const rise = levels.findIndex((level) => level > loud / 4);
  return (from + rise * blockFrames) / sampleRateHz - (beginS + RAMP_S / 2);
}

function meanSquare(samples: Float64Array, from: number, count: number): number {
  let sum = 0;
  for (let n = from; n < from + count; n++) sum += samples[n] * samples[n];
  return sum / count;
}
