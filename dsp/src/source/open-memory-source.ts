import { DspInputError } from '../errors.js';
import { channelName } from './channel-name.js';
import { findNonFinite } from './find-non-finite.js';
import { countFramesInRun } from './frame-run.js';
import type { SampleSource } from './sample-source.js';

/**
 * Opens samples that are in memory already.
 *
 * @param channels - one array a channel, all of one length; linear, ±1.0 = full scale; not copied and not modified
 * @param sampleRateHz - above 0
 * @returns a source whose reads are copies
 * @throws DspInputError `BAD_ARGUMENT` without channels, with channels of several lengths, or with a rate that is no
 *   positive number; reading throws `NON_FINITE_SAMPLE` at the first NaN or ±Infinity
 */
export function openMemorySource(channels: readonly Float64Array[], sampleRateHz: number): SampleSource {
  const frameCount = channels[0]?.length;
  if (frameCount === undefined) {
    throw new DspInputError('BAD_ARGUMENT', 'a source needs at least one channel');
  }
  if (channels.some((channel) => channel.length !== frameCount)) {
    const lengths = channels.map((channel) => channel.length).join(', ');
    throw new DspInputError('BAD_ARGUMENT', `the channels of a source must be of one length, not ${lengths}`);
  }
  if (!Number.isFinite(sampleRateHz) || sampleRateHz <= 0) {
    throw new DspInputError('BAD_ARGUMENT', `a sample rate of ${sampleRateHz} Hz can't be`);
  }
  const readRun = (fromFrame: number, count: number): Float64Array[] => {
    const present = countFramesInRun(frameCount, fromFrame, count);
    const run = channels.map((channel) => channel.slice(fromFrame, fromFrame + present));
    const faults = run
      .map((samples, index) => ({ index, frame: findNonFinite(samples) }))
      .filter(({ frame }) => frame >= 0)
      .sort((one, other) => one.frame - other.frame);
    if (faults.length > 0) {
      const { index, frame } = faults[0];
      throw new DspInputError(
        'NON_FINITE_SAMPLE',
        `frame ${fromFrame + frame} of the channel ${channelName(index)} is ${run[index][frame]}`,
      );
    }
    return run;
  };
  return {
    sampleRateHz,
    channelCount: channels.length,
    frameCount,
    // Inside a promise's chain, so that a fault rejects and never throws past the caller's catch.
    read: (fromFrame, count) => Promise.resolve().then(() => readRun(fromFrame, count)),
  };
}
