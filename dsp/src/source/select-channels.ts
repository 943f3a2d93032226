import { DspInputError } from '../errors.js';
import type { SampleSource } from './sample-source.js';

/**
 * Shows some channels of a source, in the order given, as a source of its own.
 *
 * @param source - the whole
 * @param indices - channels counted from 0, each at most once, at least one
 * @throws DspInputError `BAD_ARGUMENT` without indices or with one twice; `OUT_OF_RANGE` for one the source hasn't
 */
export function selectChannels(source: SampleSource, indices: readonly number[]): SampleSource {
  if (indices.length === 0 || new Set(indices).size !== indices.length) {
    throw new DspInputError('BAD_ARGUMENT', `channels can't be selected by the list "${indices.join(', ')}"`);
  }
  const outside = indices.find(
    (index) => !Number.isInteger(index) || index < 0 || index >= source.channelCount,
  );
  if (outside !== undefined) {
    throw new DspInputError(
      'OUT_OF_RANGE',
      `channel ${outside} was asked for, counted from 0, and there are ${source.channelCount}`,
    );
  }
  return {
    sampleRateHz: source.sampleRateHz,
    channelCount: indices.length,
    frameCount: source.frameCount,
    read: async (fromFrame, count) => {
      const channels = await source.read(fromFrame, count);
      return indices.map((index) => channels[index]);
    },
  };
}
