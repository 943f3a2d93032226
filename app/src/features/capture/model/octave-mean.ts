/** Points an octave of a smoothed curve. */
export const MEANS_PER_OCTAVE = 12;

/**
 * The power mean of a curve in dB over steps of a twelfth of an octave: of noise it leaves the level, of a smooth curve
 * the curve. Steps that hold no point are left out.
 *
 * @param x - Hz, ascending, above zero
 * @param y - dB
 */
export function octaveMean(x: ArrayLike<number>, y: ArrayLike<number>): { x: Float64Array; y: Float64Array } {
  const steps = new Map<number, { power: number; logHz: number; count: number }>();
  for (let index = 0; index < x.length; index += 1) {
    const hz = x[index] ?? NaN;
    const level = y[index] ?? NaN;
    if (!(hz > 0) || !Number.isFinite(level)) continue;
    const octaves = Math.log2(hz);
    const key = Math.floor(octaves * MEANS_PER_OCTAVE);
    const step = steps.get(key) ?? { power: 0, logHz: 0, count: 0 };
    step.power += 10 ** (level / 10);
    step.logHz += octaves;
    step.count += 1;
    steps.set(key, step);
  }
  const means = [...steps.values()];
  return {
    x: Float64Array.from(means, ({ logHz, count }) => 2 ** (logHz / count)),
    y: Float64Array.from(means, ({ power, count }) => 10 * Math.log10(power / count)),
  };
}
