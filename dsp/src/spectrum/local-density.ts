/** Quantile of a bin of pure noise that one bin in ten thousand goes beyond: standard normal deviate. */
const OUTLIER_DEVIATE = 3.72;
/** Fewest bins that make a density. */
const FEWEST_BINS = 8;

export interface LocalDensity {
  /** Mean power per bin. */
  readonly perBin: number;
  /** Bins it was taken from; 0 when there were none. */
  readonly bins: number;
}

/**
 * Median over mean of the mean of m independent exponential powers.
 *
 * @see K. P. Choi, "On the medians of gamma distributions and an equation of Ramanujan", Proc. AMS 121(1), 1994 (series
 *   from memory; agrees with chi-square quantiles)
 */
export function medianOverMean(m: number): number {
  return 1 - 1 / (3 * m) + 8 / (405 * m * m) + 184 / (25515 * m * m * m);
}

/** How far above the mean a bin of noise may stand: Wilson and Hilferty's cube root of chi-square. */
function outlierFactor(m: number): number {
  return (1 - 1 / (9 * m) + OUTLIER_DEVIATE / (3 * Math.sqrt(m))) ** 3;
}

/**
 * Gives the mean noise density on both sides of a lobe. Bins that belong to other lobes are left out; lines that
 * nobody named (hum beside a low tone, a spur) are found by standing out from the median, and left out with their
 * skirts.
 *
 * @param power - one-sided power, FS² per bin
 * @param isTaken - 1 for every bin that belongs to a lobe
 * @param first - first bin of the lobe
 * @param last - last bin of the lobe
 * @param halfWidth - half-width of a line in this spectrum, bins
 * @param effectiveAverages - what the averages are worth in independent ones
 */
export function localDensity(
  power: Float64Array,
  isTaken: Uint8Array,
  first: number,
  last: number,
  halfWidth: number,
  effectiveAverages: number,
): LocalDensity {
  let reach = Math.max(32, 4 * halfWidth);
  let bins: number[];
  for (;;) {
    const from = Math.max(0, first - reach);
    const to = Math.min(power.length - 1, last + reach);
    bins = [];
    for (let k = from; k <= to; k++) if (isTaken[k] === 0) bins.push(k);
    if (bins.length >= FEWEST_BINS || (from === 0 && to === power.length - 1)) break;
    reach *= 2;
  }
  if (bins.length === 0) return { perBin: 0, bins: 0 };

  const sorted = Float64Array.from(bins, (k) => power[k]).sort();
  const middle = sorted.length >> 1;
  const median = sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
  const limit = (median / medianOverMean(effectiveAverages)) * outlierFactor(effectiveAverages);
  const outliers = bins.filter((k) => power[k] > limit);
  const isClear = (k: number): boolean => outliers.every((line) => Math.abs(line - k) > halfWidth);
  const clear = outliers.length === 0 ? bins : bins.filter(isClear);
  // Lines everywhere: the median is all that can be had.
  if (clear.length < FEWEST_BINS)
    return { perBin: median / medianOverMean(effectiveAverages), bins: bins.length };
  let sum = 0;
  for (const k of clear) sum += power[k];
  return { perBin: sum / clear.length, bins: clear.length };
}
