import type { Random } from '../random/create-random.js';
import { openMemorySource } from '../source/open-memory-source.js';
import type { PracticeDevice, PracticeStage } from './device.js';
import { channelsOf, checkFit, randomOf } from './fit-device.js';
import { leakOf } from './stages/leak.js';
import { delayChannels, jitterChannels, runFast } from './stages/retime.js';
import { createShaper } from './stages/create-shaper.js';

function surround(samples: Float64Array, frames: number): Float64Array {
  const longer = new Float64Array(samples.length + 2 * frames);
  longer.set(samples, frames);
  return longer;
}

function addLeaks(
  channels: readonly Float64Array[],
  indices: readonly number[],
  leakInto: (index: number) => Float64Array,
): Float64Array[] {
  // Both leaks come out of the channels as they went in.
  const leaks = new Map(indices.map((index) => [index, leakInto(index)]));
  return channels.map((samples, index) => {
    const leak = leaks.get(index);
    return leak ? samples.map((sample, n) => sample + leak[n]) : samples;
  });
}

interface StageContext {
  readonly sampleRateHz: number;
  /** Of silence before the signal. */
  readonly leadFrames: number;
  readonly randomFor: (channelIndex: number) => Random;
}

/** Passes the channels through one stage; those the stage isn't for stay as they are. */
function applyStage(
  stage: PracticeStage,
  channels: Float64Array[],
  { sampleRateHz, leadFrames, randomFor }: StageContext,
): Float64Array[] {
  const indices = channelsOf(stage, channels.length);
  const retime = (retimed: readonly Float64Array[]) =>
    channels.map((samples, index) => retimed[indices.indexOf(index)] ?? samples);
  const chosen = indices.map((index) => channels[index]);
  switch (stage.kind) {
    case 'lead':
      return channels; // the silence around was laid before the first stage
    case 'delay':
      return retime(delayChannels(chosen, stage.samples));
    case 'jitter':
      return retime(jitterChannels(chosen, sampleRateHz, stage, randomFor(0)));
    case 'clock':
      return runFast(channels, stage.ppm, leadFrames);
    case 'crosstalk':
      return addLeaks(channels, indices, (index) => leakOf(channels[1 - index], sampleRateHz, stage));
    case 'gain':
    case 'offset':
    case 'polynomial':
    case 'clip':
    case 'soft-clip':
    case 'dead-zone':
    case 'filter':
    case 'polarity':
    case 'noise':
    case 'hum':
    case 'tone':
    case 'amplitude-modulation':
    case 'quantise':
      indices.forEach((index) => createShaper(stage, sampleRateHz, randomFor(index))(channels[index]));
      return channels;
  }
}

/**
 * Passes a recording through a practice device, stage by stage, in memory (about three times the recording's Float64
 * samples at the most). The same device gives the same samples every time.
 *
 * @param channels - one array a channel, all of one length; linear, ±1.0 = full scale; not modified
 * @param sampleRateHz - of the recording
 * @param device - checked, as `parseDevice` gives it
 * @returns new channels, as long as those given but for `lead` (longer at both ends) and `clock` (shorter or longer
 *   behind the signal's first frame, which stays where it is)
 * @throws DspInputError `BAD_DEVICE` when the device doesn't fit the recording, naming the stage; `BAD_ARGUMENT` without
 *   channels or with channels of several lengths
 *
 * @example
 * applyDevice([Float64Array.of(0.5)], 48_000, parseDevice({
 *   schema: 'benchlark-device/1', name: 'inverter', stages: [{ kind: 'polarity' }],
 * })); // [Float64Array [-0.5]]
 */
export function applyDevice(
  channels: readonly Float64Array[],
  sampleRateHz: number,
  device: PracticeDevice,
): Float64Array[] {
  const { channelCount } = openMemorySource(channels, sampleRateHz); // checks what it is given
  checkFit(device, sampleRateHz, channelCount);
  const leadFrames = device.stages.reduce(
    (sum, stage) => sum + (stage.kind === 'lead' ? Math.round(stage.seconds * sampleRateHz) : 0),
    0,
  );
  const start = channels.map((samples) => surround(samples, leadFrames));
  return device.stages.reduce(
    (current, stage, index) =>
      applyStage(stage, current, {
        sampleRateHz,
        leadFrames,
        randomFor: (channelIndex) => randomOf(device.seed, index, channelIndex),
      }),
    start,
  );
}
