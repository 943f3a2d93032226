/** Mean square of a full-scale sine, the reference of dBFS. */
const FULL_SCALE_SINE_MEAN_SQUARE = 0.5;

/** Volts RMS at 0 dBu: 1 mW in 600 ohm. */
export const DBU_REFERENCE_VRMS = Math.sqrt(0.6);

/**
 * Turns an amplitude ratio into decibels.
 *
 * @param ratio - linear, ≥ 0
 * @returns 20 lg(ratio) in dB; -Infinity for 0, NaN below it
 */
export function ratioToDb(ratio: number): number {
  return 20 * Math.log10(ratio);
}

/**
 * Turns a power ratio into decibels.
 *
 * @param power - linear, ≥ 0
 * @returns 10 lg(power) in dB; -Infinity for 0, NaN below it
 */
export function powerToDb(power: number): number {
  return 10 * Math.log10(power);
}

/** Turns decibels into an amplitude ratio; -Infinity gives 0. */
export function dbToRatio(db: number): number {
  return 10 ** (db / 20);
}

/** Turns decibels into a power ratio; -Infinity gives 0. */
export function dbToPower(db: number): number {
  return 10 ** (db / 10);
}

/**
 * Gives the level of a mean square against a full-scale sine.
 *
 * @param meanSquare - FS², ≥ 0
 * @returns dBFS; a full-scale sine reads 0, a full-scale square wave +3.01, silence -Infinity
 * @see AES17-2015, 3.12: 0 dB FS is the RMS level of a sine whose peak reaches full scale
 */
export function meanSquareToDbfs(meanSquare: number): number {
  return powerToDb(meanSquare / FULL_SCALE_SINE_MEAN_SQUARE);
}

/** Gives the mean square, FS², of a level in dBFS: the reverse of `meanSquareToDbfs`. */
export function dbfsToMeanSquare(levelDbfs: number): number {
  return FULL_SCALE_SINE_MEAN_SQUARE * dbToPower(levelDbfs);
}

/**
 * Gives the crest factor.
 *
 * @param peak - greatest magnitude, FS
 * @param meanSquare - FS²
 * @returns dB; 3.0103 for a sine, NaN for silence
 */
export function crestFactorDb(peak: number, meanSquare: number): number {
  return ratioToDb(peak / Math.sqrt(meanSquare));
}

/** Gives a voltage in dB re 1 V RMS. */
export function voltsToDbv(voltageVrms: number): number {
  return ratioToDb(voltageVrms);
}

/** Gives a voltage in dB re 0.7746 V RMS. */
export function voltsToDbu(voltageVrms: number): number {
  return ratioToDb(voltageVrms / DBU_REFERENCE_VRMS);
}
