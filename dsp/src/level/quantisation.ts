import { powerToDb, ratioToDb } from './decibel.js';

export type DitherShape = 'none' | 'rectangular' | 'triangular';

/** Variance of the total error in LSB². */
const ERROR_VARIANCE_LSB2: Readonly<Record<DitherShape, number>> = {
  none: 1 / 12,
  rectangular: 1 / 6,
  triangular: 1 / 4,
};

/** Step of a quantiser with `bits` bits, against a full-scale peak of 1. */
export function lsbOf(bits: number): number {
  return 2 ** (1 - bits);
}

/**
 * Gives the noise of an ideal quantiser over the whole band, 0 to half the sample rate.
 *
 * @param bits - 1 or more
 * @param dither - `none` holds only for a busy signal
 * @returns mean square, FS²
 * @see Lipshitz, Wannamaker and Vanderkooy, "Quantization and Dither: A Theoretical Survey", JAES 40(5), 1992
 */
export function quantisationNoise(bits: number, dither: DitherShape): number {
  return ERROR_VARIANCE_LSB2[dither] * lsbOf(bits) ** 2;
}

/** Gives the signal-to-noise ratio in dB of a full-scale sine through an ideal quantiser, over the whole band. */
export function idealSnrDb(bits: number, dither: DitherShape): number {
  return powerToDb(0.5 / quantisationNoise(bits, dither));
}

/** SINAD in dB of a full-scale sine in an ideal quantiser of 0 bits: 10 lg 1.5. */
const SINAD_AT_ZERO_BITS_DB = powerToDb(1.5);
const SINAD_PER_BIT_DB = ratioToDb(2);

/**
 * Turns SINAD into the effective number of bits.
 *
 * @param sinadDb - measured SINAD
 * @param levelDbfs - level of the tone; below full scale the missing part is added to SINAD first. Leave it out for
 *   the figure from SINAD alone
 * @returns bits
 * @see IEEE Std 1241, effective number of bits (clause from memory)
 */
export function effectiveBits(sinadDb: number, levelDbfs = 0): number {
  return (sinadDb - levelDbfs - SINAD_AT_ZERO_BITS_DB) / SINAD_PER_BIT_DB;
}
