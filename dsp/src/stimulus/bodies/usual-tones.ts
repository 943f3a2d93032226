/** @see AES17-2015: 997 Hz, a prime, meets many codes and never locks to the rate */
export const TONE_HZ = 997;
/** @see SMPTE RP 120 */
export const MODULATION_TONES_HZ = { lowFrequencyHz: 60, highFrequencyHz: 7000 } as const;
/** Common practice, no source. */
export const DIFFERENCE_TONES_HZ = { lowFrequencyHz: 19_000, highFrequencyHz: 20_000 } as const;
