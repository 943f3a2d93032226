import { sha256 } from '@noble/hashes/sha2';
import { bytesToHex } from '@noble/hashes/utils';
import { createWavEncoder, PRACTICE_DESCRIPTION, type BroadcastExtensionInput } from '@benchlark/dsp';

/** Blocks kept one after the other, as they came. */
export class Recording {
  readonly sampleRateHz: number;
  readonly channelCount: number;
  #blocks: (readonly Float32Array[])[] = [];
  #frames = 0;
  readonly #mostFrames: number;

  /** @param mostFrames - the oldest blocks are given up beyond it */
  constructor(sampleRateHz: number, channelCount: number, mostFrames = Infinity) {
    this.sampleRateHz = sampleRateHz;
    this.channelCount = channelCount;
    this.#mostFrames = mostFrames;
  }

  get frames(): number {
    return this.#frames;
  }

  push(channels: readonly Float32Array[]): void {
    this.#blocks.push(channels);
    this.#frames += channels[0]?.length ?? 0;
    while (this.#frames - (this.#blocks[0]?.[0]?.length ?? 0) >= this.#mostFrames) {
      this.#frames -= this.#blocks.shift()?.[0]?.length ?? 0;
    }
  }

  clear(): void {
    this.#blocks = [];
    this.#frames = 0;
  }

  /** The newest frames alone, as a recording of its own. */
  newest(frames: number): Recording {
    const last = new Recording(this.sampleRateHz, this.channelCount);
    let skip = Math.max(0, this.#frames - frames);
    for (const block of this.#blocks) {
      const length = block[0]?.length ?? 0;
      if (skip < length) last.push(skip === 0 ? block : block.map((samples) => samples.subarray(skip)));
      skip = Math.max(0, skip - length);
    }
    return last;
  }

  /** The first frames in double precision, one array a channel. */
  toChannels(mostFrames: number): Float64Array[] {
    const count = Math.min(mostFrames, this.#frames);
    return Array.from({ length: this.channelCount }, (_, channel) => {
      const samples = new Float64Array(count);
      let at = 0;
      for (const block of this.#blocks) {
        const part = block[channel]?.subarray(0, count - at) ?? [];
        samples.set(part, at);
        at += part.length;
      }
      return samples;
    });
  }

  /** The very samples as a WAV file of 32-bit floats, and the SHA-256 of its bytes. */
  toWav(about: { description: string; isPractice: boolean; startedAt: string }): {
    wav: Blob;
    sha256: string;
  } {
    const encoder = createWavEncoder({
      sampleRateHz: this.sampleRateHz,
      channelCount: this.channelCount,
      frameCount: this.#frames,
      bits: '32f',
      dither: 'none',
      seed: 0,
      broadcast: broadcastOf(about),
    });
    const hash = sha256.create();
    const header = encoder.header();
    hash.update(header);
    const parts = [new Uint8Array(header)];
    for (const block of this.#blocks) {
      const bytes = encoder.block(block.map((samples) => Float64Array.from(samples)));
      hash.update(bytes);
      parts.push(new Uint8Array(bytes));
    }
    return { wav: new Blob(parts, { type: 'audio/wav' }), sha256: bytesToHex(hash.digest()) };
  }
}

/** A practice take says so in the file itself: no copy of it can ever pass as real. */
function broadcastOf({
  description,
  isPractice,
  startedAt,
}: {
  description: string;
  isPractice: boolean;
  startedAt: string;
}): BroadcastExtensionInput {
  const [date = '', time = ''] = startedAt.split('T');
  return {
    description: isPractice ? `${PRACTICE_DESCRIPTION} ${description}` : description,
    originator: 'Benchlark',
    originationDate: date,
    originationTime: time.slice(0, 8),
  };
}
