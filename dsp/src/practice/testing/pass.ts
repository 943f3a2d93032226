import { applyDevice } from '../apply-device.js';
import { DEVICE_SCHEMA, type PracticeStage } from '../device.js';

/** Passes channels through stages alone. */
export function pass(
  channels: readonly Float64Array[],
  sampleRateHz: number,
  stages: readonly PracticeStage[],
  seed = 1,
): Float64Array[] {
  return applyDevice(channels, sampleRateHz, {
    schema: DEVICE_SCHEMA,
    name: 'test',
    sampleRateHz: null,
    seed,
    stages,
  });
}

/** Peak amplitude of the line in bin `cycles`, by the definition of the DFT; `cycles` may exceed half the length. */
export function lineOf(samples: Float64Array, cycles: number): number {
  const { length } = samples;
  let re = 0;
  let im = 0;
  for (let n = 0; n < length; n++) {
    const angle = (2 * Math.PI * ((n * cycles) % length)) / length;
    re += samples[n] * Math.cos(angle);
    im += samples[n] * Math.sin(angle);
  }
  return (2 * Math.hypot(re, im)) / length;
}
