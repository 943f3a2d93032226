/** Draws the next value, uniform in [0, 1). */
export type Random = () => number;

const UINT32 = 4294967296;

/** Spreads one seed over the generator's state. */
function splitMix32(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x9e3779b9) >>> 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return (z ^ (z >>> 16)) >>> 0;
  };
}

/**
 * Makes a seeded generator, so that a stimulus or a practice device gives the same samples everywhere.
 *
 * @param seed - any whole number, 0 to 2^32 - 1
 * @returns a function that draws uniform values in [0, 1) with 53 random bits
 * @see D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM TOMS 47(4), 2021 (xoshiro128**)
 */
export function createRandom(seed: number): Random {
  const spread = splitMix32(seed);
  let a = spread();
  let b = spread();
  let c = spread();
  let d = spread();
  const next = (): number => {
    const five = Math.imul(b, 5);
    const result = Math.imul((five << 7) | (five >>> 25), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = (d << 11) | (d >>> 21);
    return result;
  };
  return () => ((next() >>> 5) * 67108864 + (next() >>> 6)) / (UINT32 * 2097152);
}

/**
 * Draws one value of triangular density over (-1, 1): the sum of two independent uniform values, as TPDF dither of
 * 2 LSB width wants it.
 *
 * @see Lipshitz, Wannamaker and Vanderkooy, "Quantization and Dither: A Theoretical Survey", JAES 40(5), 1992
 */
export function drawTriangular(random: Random): number {
  return random() - random();
}
