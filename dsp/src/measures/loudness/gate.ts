/** Loudness of a weighted mean square, LUFS. @see ITU-R BS.1770-5, Annex 1 */
export function loudnessOf(meanSquare: number): number {
  return -0.691 + 10 * Math.log10(meanSquare);
}

function meanSquareOf(lufs: number): number {
  return 10 ** ((lufs + 0.691) / 10);
}

const ABSOLUTE_LUFS = -70;
const RELATIVE_LU = -10;
const RANGE_RELATIVE_LU = -20;
const LOW_PERCENTILE = 0.1;
const HIGH_PERCENTILE = 0.95;

/** Means of runs of `width` sub-blocks, one for every sub-block on. */
export function slidingMeans(blocks: ArrayLike<number>, width: number): Float64Array {
  const count = Math.max(0, blocks.length - width + 1);
  return Float64Array.from({ length: count }, (_, from) => {
    let sum = 0;
    for (let k = from; k < from + width; k++) sum += blocks[k];
    return sum / width;
  });
}

/** Those above the absolute gate, then those above a gate relative to their mean. */
function gated(meanSquares: Float64Array, relativeLu: number): Float64Array {
  const loud = meanSquares.filter((value) => value > meanSquareOf(ABSOLUTE_LUFS));
  if (loud.length === 0) return loud;
  const threshold = mean(loud) * 10 ** (relativeLu / 10);
  return loud.filter((value) => value > threshold);
}

function mean(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/**
 * Integrated loudness: blocks of 400 ms gated at -70 LUFS and 10 LU below the mean of the rest.
 *
 * @param momentary - mean squares of the blocks
 * @returns null when nothing passes the gates
 */
export function integratedLoudness(momentary: Float64Array): number | null {
  const kept = gated(momentary, RELATIVE_LU);
  return kept.length === 0 ? null : loudnessOf(mean(kept));
}

/**
 * Loudness range: from the 10th to the 95th percentile of the short-term values above -70 LUFS and 20 LU below their mean.
 *
 * @see EBU Tech 3342
 */
export function loudnessRange(shortTerm: Float64Array): number | null {
  const kept = gated(shortTerm, RANGE_RELATIVE_LU).sort();
  if (kept.length === 0) return null;
  const at = (share: number): number => loudnessOf(kept[Math.round(share * (kept.length - 1))]);
  return at(HIGH_PERCENTILE) - at(LOW_PERCENTILE);
}
