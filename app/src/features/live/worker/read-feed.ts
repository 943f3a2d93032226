import type { InputFeed } from '../audio/audio-rig';

/** Samples as they came, one array a channel, and the rate they came at where the browser says. */
export interface InputBlock {
  readonly channels: readonly Float32Array[];
  readonly sampleRateHz: number | null;
}

/** Hands on every block of a feed until it ends. */
export async function readFeed(feed: InputFeed, take: (block: InputBlock) => void): Promise<void> {
  if (feed.kind === 'track') return readTrack(feed.readable, take);
  return new Promise((resolve) => {
    feed.port.onmessage = ({ data }: MessageEvent<Float32Array[] | null>) => {
      if (data === null) resolve();
      else take({ channels: data, sampleRateHz: null });
    };
  });
}

async function readTrack(
  readable: ReadableStream<AudioData>,
  take: (block: InputBlock) => void,
): Promise<void> {
  const reader = readable.getReader();
  for (let part = await reader.read(); !part.done; part = await reader.read()) {
    const data = part.value;
    const channels = Array.from({ length: data.numberOfChannels }, (_, planeIndex) => {
      const samples = new Float32Array(data.numberOfFrames);
      data.copyTo(samples, { planeIndex, format: 'f32-planar' });
      return samples;
    });
    const sampleRateHz = data.sampleRate;
    data.close();
    take({ channels, sampleRateHz });
  }
}
