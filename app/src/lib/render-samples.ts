import { createStimulus, type StimulusOptions } from '@benchlark/dsp';

/** A run of a stimulus, one array a channel, as an AudioBuffer takes them. */
export interface SampleChunk {
  readonly fromFrame: number;
  readonly channels: readonly Float32Array<ArrayBuffer>[];
}

const CHUNK_FRAMES = 65_536;

/**
 * Renders a stimulus as samples for playing: chunk by chunk, without the dither that a file of integers would have.
 *
 * @throws DspInputError naming the parameter that can't be
 */
export async function renderStimulus(
  name: string,
  options: Omit<StimulusOptions, 'bitsPerSample' | 'dither'>,
  onChunk: (chunk: SampleChunk) => void | Promise<void>,
): Promise<{ readonly sampleRateHz: number; readonly frameCount: number }> {
  const { source } = createStimulus(name, { ...options, bitsPerSample: '32f' });
  const { frameCount, sampleRateHz } = source;
  for (let fromFrame = 0; fromFrame < frameCount; fromFrame += CHUNK_FRAMES) {
    const block = await source.read(fromFrame, CHUNK_FRAMES);
    await onChunk({ fromFrame, channels: block.map((samples) => Float32Array.from(samples)) });
  }
  return { sampleRateHz, frameCount };
}
