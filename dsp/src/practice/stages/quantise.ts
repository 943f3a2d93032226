import { drawTriangular, type Random } from '../../random/create-random.js';

/**
 * Rounds samples to a number of bits in place, as floor(v + 0.5), and holds them to the codes there are.
 *
 * @param random - where TPDF dither of 2 LSB width is drawn from; null for none
 */
export function quantise(samples: Float64Array, bits: number, random: Random | null): void {
  const scale = 2 ** (bits - 1);
  for (let n = 0; n < samples.length; n++) {
    const dither = random ? drawTriangular(random) : 0;
    const code = Math.floor(samples[n] * scale + dither + 0.5);
    samples[n] = Math.min(scale - 1, Math.max(-scale, code)) / scale;
  }
}
