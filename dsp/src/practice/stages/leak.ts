import { dbToRatio, ratioToDb } from '../../level/decibel.js';
import type { CrosstalkStage } from '../device.js';
import { filterWithoutPhase } from './convolve.js';

const REFERENCE_HZ = 1000;
/** Below it a leak that falls with frequency rises no further. */
const LOWEST_HZ = 10;
const DB_PER_OCTAVE_AT_SLOPE_1 = ratioToDb(2);

/**
 * Gives what leaks out of a channel: its level at 1 kHz, and so many decibels more for every octave above.
 *
 * @param samples - the channel that leaks; not modified
 * @returns a new array; zero-phase, the slope held to 0.1 dB from 50 Hz to 0.45 of the rate
 */
export function leakOf(samples: Float64Array, sampleRateHz: number, stage: CrosstalkStage): Float64Array {
  const gain = dbToRatio(stage.levelDb);
  if (stage.slopeDbPerOctave === 0) return samples.map((sample) => sample * gain);
  const power = stage.slopeDbPerOctave / DB_PER_OCTAVE_AT_SLOPE_1;
  return filterWithoutPhase(samples, sampleRateHz, (frequencyHz) => {
    if (power > 0) return gain * (frequencyHz / REFERENCE_HZ) ** power;
    return gain * (Math.max(LOWEST_HZ, frequencyHz) / REFERENCE_HZ) ** power;
  });
}
