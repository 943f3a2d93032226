import { DspInputError } from '../errors.js';
import { makeWarning } from '../record/make-warning.js';
import type { Warning } from '../record/record.js';
import { channelName } from '../source/channel-name.js';
import type { WavFile } from './wav-file.js';

/** What a look at every sample of a file shows; arrays have one entry a channel. */
export interface WavInspection {
  /** Largest magnitude, linear, 1 = full scale. */
  readonly peakFs: readonly number[];
  /** Samples at the largest or smallest code, in float at exactly ±1. */
  readonly fullScaleCounts: readonly number[];
  /** Samples beyond ±1, which float alone can hold. */
  readonly overCounts: readonly number[];
  /** Those of the header and those that only the samples show. */
  readonly warnings: readonly Warning[];
}

export interface InspectOptions {
  /** Told the share of the work done, 0 to 1, never falling. */
  readonly onProgress?: (share: number) => void;
  /** Looked at between blocks; once aborted, the look throws `CANCELLED`. */
  readonly signal?: { readonly aborted: boolean };
}

const BLOCK_FRAMES = 65_536;

class ChannelTally {
  peak = 0;
  fullScale = 0;
  over = 0;
  hasLowBits = false;

  constructor(
    private readonly largest: number,
    /** 2^(valid bits - 1) where a sample could hold more bits than the valid ones; else 0. */
    private readonly validScale: number,
  ) {}

  add(samples: Float64Array): void {
    let { peak, fullScale, over } = this;
    const { largest } = this;
    for (let n = 0; n < samples.length; n++) {
      const sample = samples[n];
      const magnitude = Math.abs(sample);
      peak = magnitude > peak ? magnitude : peak;
      if (sample >= largest || sample <= -1) {
        over += magnitude > 1 ? 1 : 0;
        fullScale += magnitude > 1 ? 0 : 1;
      }
    }
    this.peak = peak;
    this.fullScale = fullScale;
    this.over = over;
    if (this.validScale > 0 && !this.hasLowBits) {
      this.hasLowBits = samples.some((sample) => !Number.isInteger(sample * this.validScale));
    }
  }
}

/**
 * Reads every sample of a file.
 *
 * @param wav - an opened file
 * @returns peaks, counts and all warnings about the file
 * @throws DspInputError `NON_FINITE_SAMPLE` naming frame, channel and byte of the first NaN or ±Infinity; `CANCELLED`;
 *   `WAV_CHANGED_WHILE_READ`
 */
export async function inspectWav(wav: WavFile, options: InspectOptions = {}): Promise<WavInspection> {
  const { sampleFormat, bitsPerSample, containerBits } = wav.format;
  const isInteger = sampleFormat === 'integer';
  const largest = isInteger ? 1 - 2 ** (1 - bitsPerSample) : 1;
  const validScale = isInteger && bitsPerSample < containerBits ? 2 ** (bitsPerSample - 1) : 0;
  const tallies = Array.from({ length: wav.channelCount }, () => new ChannelTally(largest, validScale));
  for (let frame = 0; frame < wav.frameCount; frame += BLOCK_FRAMES) {
    if (options.signal?.aborted === true) {
      throw new DspInputError('CANCELLED', 'the look at the file was cancelled');
    }
    const channels = await wav.read(frame, BLOCK_FRAMES);
    channels.forEach((samples, index) => tallies[index].add(samples));
    options.onProgress?.(Math.min(1, (frame + BLOCK_FRAMES) / wav.frameCount));
  }
  const warnings = [...wav.warnings];
  if (tallies.some((tally) => tally.hasLowBits)) {
    warnings.push(makeWarning('valid-bits-exceeded', { bits: bitsPerSample, containerBits }));
  }
  tallies.forEach(({ over, peak }, index) => {
    if (over > 0) {
      const channel = channelName(index);
      warnings.push(
        makeWarning('over-full-scale', { channel, count: over, peak: peak.toPrecision(4) }, { channel }),
      );
    }
  });
  return {
    peakFs: tallies.map(({ peak }) => peak),
    fullScaleCounts: tallies.map(({ fullScale }) => fullScale),
    overCounts: tallies.map(({ over }) => over),
    warnings,
  };
}
