import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext } from '../measure.js';
import { streamFrames, type FrameRange } from './stream-frames.js';

const BLOCK_S = 0.01;
const BLOCKS_AT_MOST = 65_536;
/** Holds two periods of the lowest tone's square, so that a steady tone shows a steady level. */
const SMOOTHING_S = 0.1;
/** A level belongs to a plateau while it lies this near the plateau's mean, dB. */
const PLATEAU_DB = 2;
/** Left out after a beginning and before an end inside the file: fades and filters settle. */
const SETTLING_S = 0.15;
const FLOOR_DB = -200;

/** Mean square of all channels together, block by block, the mean of the whole taken out. */
interface Envelope {
  readonly blockFrames: number;
  readonly blocksDb: Float64Array;
}

/**
 * Finds the steady part of a recording: past a lead-in, a silence and a fade, before a mute at the end.
 *
 * Levels in blocks of 10 ms, smoothed over 100 ms, are cut into plateaus; the one with the greatest product of duration
 * and root amplitude is the steady part, so a long quiet stimulus wins over a short louder lead-in and a short loud tone
 * over a long silence.
 *
 * @param source - the channels to be analysed
 * @returns the frames of the steady part; the whole file where the level never leaves its plateau
 */
export async function findSteadyPart(
  source: SampleSource,
  context: Pick<AnalysisContext, 'signal'>,
  onShare: (share: number) => void,
): Promise<FrameRange> {
  const envelope = await readEnvelope(source, context, onShare);
  const { blockFrames, blocksDb } = envelope;
  const smoothBlocks = Math.max(1, Math.round((SMOOTHING_S * source.sampleRateHz) / blockFrames));
  const smooth = smoothLevels(blocksDb, smoothBlocks);
  const best = bestPlateau(smooth);
  const range = withinTenDecibels(smooth, best);
  return trimToFrames(range, envelope, source);
}

async function readEnvelope(
  source: SampleSource,
  context: Pick<AnalysisContext, 'signal'>,
  onShare: (share: number) => void,
): Promise<Envelope> {
  const wanted = Math.round(BLOCK_S * source.sampleRateHz);
  const blockFrames = Math.max(1, wanted, Math.ceil(source.frameCount / BLOCKS_AT_MOST));
  const count = Math.max(1, Math.floor(source.frameCount / blockFrames));
  const sums = Array.from({ length: source.channelCount }, () => new Float64Array(count));
  const squares = new Float64Array(count);
  let at = 0;
  await streamFrames(
    source,
    { from: 0, to: source.frameCount },
    context,
    (channels) => {
      channels.forEach((samples, channel) => addToBlocks(samples, at, blockFrames, sums[channel], squares));
      at += channels[0].length;
    },
    onShare,
  );
  const meanSquares = squares.map((square) => square / blockFrames);
  for (const channelSums of sums) {
    const mean = channelSums.reduce((sum, value) => sum + value, 0) / (count * blockFrames);
    channelSums.forEach((sum, block) => {
      meanSquares[block] += mean * mean - (2 * mean * sum) / blockFrames;
    });
  }
  return {
    blockFrames,
    blocksDb: meanSquares.map((value) => Math.max(FLOOR_DB, 10 * Math.log10(Math.max(value, 0)))),
  };
}

/** Adds samples, the first being frame `at`, to their blocks; frames past the last block join it. */
function addToBlocks(
  samples: Float64Array,
  at: number,
  blockFrames: number,
  sums: Float64Array,
  squares: Float64Array,
): void {
  let n = 0;
  while (n < samples.length) {
    const block = Math.floor((at + n) / blockFrames);
    if (block >= sums.length) return; // less than one block at the end: its level would say little
    const end = Math.min(samples.length, (block + 1) * blockFrames - at);
    let sum = 0;
    let square = 0;
    for (; n < end; n++) {
      sum += samples[n];
      square += samples[n] * samples[n];
    }
    sums[block] += sum;
    squares[block] += square;
  }
}

/** Moving mean of the power, in dB; shorter at the ends. */
function smoothLevels(blocksDb: Float64Array, width: number): Float64Array {
  const cumulative = new Float64Array(blocksDb.length + 1);
  for (let k = 0; k < blocksDb.length; k++) cumulative[k + 1] = cumulative[k] + 10 ** (blocksDb[k] / 10);
  return blocksDb.map((_, k) => {
    const from = Math.max(0, k - (width >> 1));
    const to = Math.min(blocksDb.length, from + width);
    // Differences of a running sum can fall a rounding below zero in a silence after a loud part.
    const mean = Math.max(0, cumulative[to] - cumulative[from]) / (to - from);
    return Math.max(FLOOR_DB, 10 * Math.log10(mean));
  });
}

function bestPlateau(levels: Float64Array): FrameRange {
  let best: FrameRange = { from: 0, to: levels.length };
  let bestScore = -1;
  let from = 0;
  let sum = levels[0];
  for (let k = 1; k <= levels.length; k++) {
    const mean = sum / (k - from);
    if (k < levels.length && Math.abs(levels[k] - mean) <= PLATEAU_DB) {
      sum += levels[k];
      continue;
    }
    const score = (k - from) * 10 ** (mean / 40);
    if (score > bestScore) {
      bestScore = score;
      best = { from, to: k };
    }
    from = k;
    sum = levels[k] ?? 0;
  }
  return best;
}

/** A tone that wavers falls into short plateaus: if the stretch around within 10 dB is twice as long, that is the part. */
function withinTenDecibels(levels: Float64Array, plateau: FrameRange): FrameRange {
  const reference = levels[(plateau.from + plateau.to) >> 1];
  const near = (k: number): boolean => Math.abs(levels[k] - reference) <= 10;
  let { from, to } = plateau;
  while (from > 0 && near(from - 1)) from--;
  while (to < levels.length && near(to)) to++;
  return to - from > 2 * (plateau.to - plateau.from) ? { from, to } : plateau;
}

function trimToFrames(range: FrameRange, envelope: Envelope, source: SampleSource): FrameRange {
  const { blockFrames, blocksDb } = envelope;
  const last = blocksDb.length;
  const length = (range.to - range.from) * blockFrames;
  const settling = Math.round(Math.min(SETTLING_S * source.sampleRateHz, length / 8));
  const middle = blocksDb.slice(range.from, range.to).sort()[(range.to - range.from) >> 1];
  const fadesAt = (block: number): boolean => blocksDb[block] < middle - 3;
  const opensInside = range.from > 0 || fadesAt(0);
  const endsInside = range.to < last || fadesAt(last - 1);
  return {
    from: opensInside ? onGrid(range.from * blockFrames + settling, source.sampleRateHz) : 0,
    to: endsInside ? onGrid(range.to * blockFrames - settling, source.sampleRateHz) : source.frameCount,
  };
}

/** The nearest frame to a whole hundredth of a second, so that a record's rounded times name the same frame again. */
export function onGrid(frame: number, sampleRateHz: number): number {
  return Math.round((Math.round((frame / sampleRateHz) * 100) / 100) * sampleRateHz);
}
