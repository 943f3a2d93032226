import type { Random } from './create-random.js';

/**
 * Makes a source of standard normal values.
 *
 * @param random - the uniform source drawn from
 * @returns a function that draws the next value: mean 0, variance 1, each independent of the others
 * @see G. E. P. Box and M. E. Muller, "A Note on the Generation of Random Normal Deviates", Ann. Math. Stat. 29(2), 1958
 */
export function createGaussian(random: Random): () => number {
  let spare: number | null = null;
  return () => {
    if (spare !== null) {
      const value = spare;
      spare = null;
      return value;
    }
    // 1 - random() lies in (0, 1], so that its logarithm is finite.
    const radius = Math.sqrt(-2 * Math.log(1 - random()));
    const angle = 2 * Math.PI * random();
    spare = radius * Math.sin(angle);
    return radius * Math.cos(angle);
  };
}
