/** Bins over which the noise is taken to be level; wide enough that a line's lobe is the smaller part of them. */
const NEIGHBOURHOOD_BINS = 64;

/**
 * Tells the variance of each bin's power before averaging.
 *
 * A bin of noise scatters by its own mean; a steady line of power S over noise of mean N only by N² + 2 S N. What
 * stands above the median of its neighbourhood is taken for such a line, so that hum does not pass for noise that is
 * badly known.
 *
 * @param power - FS² a bin; not modified
 * @returns FS⁴ a bin, of the same length
 * @see S. M. Kay, "Fundamentals of Statistical Signal Processing: Detection Theory", 1998, 2.2.3 (noncentral chi-square)
 */
export function binVariances(power: Float64Array): Float64Array {
  const variances = new Float64Array(power.length);
  for (let from = 0; from < power.length; from += NEIGHBOURHOOD_BINS) {
    const to = Math.min(power.length, from + NEIGHBOURHOOD_BINS);
    const sorted = power.slice(from, to).sort();
    const level = sorted[sorted.length >> 1];
    for (let k = from; k < to; k++) {
      const noise = Math.min(power[k], Math.max(level, Number.MIN_VALUE));
      variances[k] = noise * noise + 2 * (power[k] - noise) * noise;
    }
  }
  return variances;
}
