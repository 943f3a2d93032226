import type { SampleSource } from '@benchlark/dsp';
import type { Overview } from '../captures/capture-overview.entity';

export const OVERVIEW_BINS_MAX = 2_000;
const BLOCK_FRAMES = 1 << 16;
/** Four digits are more than any screen shows of it. */
const round = (value: number) => Math.round(value * 1e4) / 1e4;

/**
 * Reads every sample of a capture once and keeps the least and greatest of each run of frames.
 *
 * @param onProgress - told the share read, 0 to 1
 * @returns at most 2,000 bins a channel; the last may be of fewer frames
 * @throws DspInputError NON_FINITE_SAMPLE from the source
 */
export async function makeOverview(
  source: SampleSource,
  onProgress: (share: number) => void,
): Promise<Overview> {
  const { frameCount, channelCount } = source;
  const framesPerBin = Math.max(1, Math.ceil(frameCount / OVERVIEW_BINS_MAX));
  const bins = Math.ceil(frameCount / framesPerBin);
  const least = Array.from({ length: channelCount }, () => new Float64Array(bins).fill(Infinity));
  const greatest = Array.from({ length: channelCount }, () => new Float64Array(bins).fill(-Infinity));
  for (let from = 0; from < frameCount; from += BLOCK_FRAMES) {
    const block = await source.read(from, Math.min(BLOCK_FRAMES, frameCount - from));
    block.forEach((samples, channel) => {
      const low = least[channel];
      const high = greatest[channel];
      if (low && high) spread(samples, from, framesPerBin, { low, high });
    });
    onProgress(Math.min(1, (from + BLOCK_FRAMES) / frameCount));
  }
  return {
    framesPerBin,
    channels: least.map((low, channel) => ({
      min: Array.from(low, round),
      max: Array.from(greatest[channel] ?? [], round),
    })),
  };
}

function spread(
  samples: Float64Array,
  from: number,
  framesPerBin: number,
  { low, high }: { low: Float64Array; high: Float64Array },
): void {
  let n = 0;
  while (n < samples.length) {
    const bin = Math.floor((from + n) / framesPerBin);
    const end = Math.min(samples.length, (bin + 1) * framesPerBin - from);
    let min = low[bin] ?? Infinity;
    let max = high[bin] ?? -Infinity;
    for (; n < end; n++) {
      const sample = samples[n] ?? 0;
      if (sample < min) min = sample;
      if (sample > max) max = sample;
    }
    low[bin] = min;
    high[bin] = max;
  }
}
