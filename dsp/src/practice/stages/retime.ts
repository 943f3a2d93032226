import { createGaussian } from '../../random/create-gaussian.js';
import type { Random } from '../../random/create-random.js';
import type { JitterStage } from '../device.js';
import { interpolate } from './interpolate.js';
import { createSine } from './oscillator.js';

const SECONDS_PER_PS = 1e-12;

/** Shifts channels by a number of frames, fractions allowed; their length stays. */
export function delayChannels(channels: readonly Float64Array[], delayFrames: number): Float64Array[] {
  return interpolate(channels, channels[0].length, (frame) => frame - delayFrames);
}

/**
 * Plays channels on a clock that is `ppm` fast against the recorder's: frame n of the recording holds what stood at
 * (n - pivot) · (1 + ppm · 1e-6) + pivot.
 *
 * @param pivotFrame - where both clocks agree: the signal's first frame, so that its delay stays what it was
 * @returns channels of pivot + (length - pivot) / (1 + ppm · 1e-6) frames, rounded
 */
export function runFast(channels: readonly Float64Array[], ppm: number, pivotFrame: number): Float64Array[] {
  const speed = 1 + ppm * 1e-6;
  const frameCount = pivotFrame + Math.round((channels[0].length - pivotFrame) / speed);
  return interpolate(channels, frameCount, (frame) => (frame - pivotFrame) * speed + pivotFrame);
}

/**
 * Takes every sample at n/rate + J(n): J = ½ · peak to peak · sin(2π · frequency · t), or J white and Gaussian. All
 * channels share it, as converters on one clock do.
 */
export function jitterChannels(
  channels: readonly Float64Array[],
  sampleRateHz: number,
  stage: JitterStage,
  random: Random,
): Float64Array[] {
  const framesPerPs = SECONDS_PER_PS * sampleRateHz;
  if (stage.rmsPs !== undefined) {
    const rmsFrames = stage.rmsPs * framesPerPs;
    const draw = createGaussian(random);
    return interpolate(channels, channels[0].length, (frame) => frame + rmsFrames * draw());
  }
  const peakFrames = ((stage.peakToPeakPs ?? 0) / 2) * framesPerPs;
  const sine = createSine(stage.frequencyHz ?? 0, sampleRateHz);
  return interpolate(channels, channels[0].length, (frame) => frame + peakFrames * sine(frame));
}
