import type { StimulusStep } from '../../../stimulus/descriptor.js';
import type { LevelEnvelope } from './follow-level.js';

/** Steps this far below the top count no more: they may lie in the noise. */
const DEPTH_DB = 45;
/** Blocks of each step that are looked at: its edges and what lies between. */
const LOOKS = 7;
/** Beside a step's edges a block holds two levels. */
const EDGE_S = 0.03;
/** Half of the blocks lie this near the ladder, whatever a device does to its top. */
const LIKENESS_DB = 0.7;
/** So many of the ladder's blocks must be in the recording. */
const LEAST_SHARE = 0.4;
/** Of two places that fit alike the one with more of the ladder counts. */
const MISSING_DB = 0.3;
/** A ladder needs a few steps to be told from a tone that fades. */
const LEAST_SPAN_DB = 6;

/**
 * Finds by how much a ladder of levels is delayed in a recording: the delay at which the recorded levels follow it best.
 *
 * @param ladder - steps with times in the file
 * @returns seconds, negative when the recorder started late; null when no delay fits
 */
export function matchLadder(envelope: LevelEnvelope, ladder: readonly StimulusStep[]): number | null {
  const { blockS, levelsDb } = envelope;
  const top = Math.max(...ladder.map(({ levelDbfs }) => levelDbfs));
  const near = ladder.filter(({ levelDbfs }) => levelDbfs >= top - DEPTH_DB);
  const edgeS = Math.max(EDGE_S, blockS);
  const template = near.flatMap(({ levelDbfs, fromS, toS }) => {
    const first = Math.ceil((fromS + edgeS) / blockS);
    const count = Math.max(0, Math.floor((toS - edgeS) / blockS) - first);
    const looks = Math.min(LOOKS, count);
    return Array.from({ length: looks }, (_, k) => ({
      block: first + Math.round((k * (count - 1)) / Math.max(1, looks - 1)),
      levelDbfs,
    }));
  });
  if (template.length === 0) return null;
  const firstBlock = template[0].block;
  const lastBlock = template[template.length - 1].block;
  let best = { delay: 0, error: Infinity };
  for (let delay = -lastBlock; delay < levelsDb.length - firstBlock; delay++) {
    const error = errorAt(levelsDb, template, delay);
    if (error < best.error) best = { delay, error };
  }
  return best.error <= LIKENESS_DB ? best.delay * blockS : null;
}

interface TemplateBlock {
  readonly block: number;
  readonly levelDbfs: number;
}

/** Median distance of the recorded levels from the ladder, dB, the gain between them taken out. */
function errorAt(levelsDb: Float64Array, template: readonly TemplateBlock[], delay: number): number {
  const gains: number[] = [];
  let [low, high] = [Infinity, -Infinity];
  for (const { block, levelDbfs } of template) {
    const at = block + delay;
    if (at < 0 || at >= levelsDb.length) continue;
    gains.push(levelsDb[at] - levelDbfs);
    low = Math.min(low, levelDbfs);
    high = Math.max(high, levelDbfs);
  }
  if (gains.length < LEAST_SHARE * template.length || high - low < LEAST_SPAN_DB) return Infinity;
  gains.sort((one, other) => one - other);
  const gain = gains[gains.length >> 1];
  const off = gains.map((value) => Math.abs(value - gain)).sort((one, other) => one - other);
  // Three quarters must follow it: half of a steady tone's blocks always lie near one level.
  const error = off[Math.floor(off.length * 0.75)];
  return error + MISSING_DB * (1 - gains.length / template.length);
}
