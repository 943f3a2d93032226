import type { DspInputError } from '../errors.js';
import { channelName } from '../source/channel-name.js';
import { findNonFinite } from '../source/find-non-finite.js';
import { countFramesInRun } from '../source/frame-run.js';
import { decodeSamples } from './decode-samples.js';
import { type RandomAccessBytes, readExactly } from './random-access-bytes.js';
import { refuseWav } from './refuse-wav.js';
import type { WavFormat } from './wav-file.js';

/** Bytes fetched at a time, so that a long run needs little memory beside the samples asked for. */
const BLOCK_BYTES = 1 << 20;

/** Where the frames of an opened file stand. */
export interface FramePlace {
  readonly format: WavFormat;
  readonly dataOffset: number;
  readonly frameCount: number;
}

function nonFiniteError(place: FramePlace, frame: number, index: number, sample: number): DspInputError {
  const { format, dataOffset } = place;
  return refuseWav('NON_FINITE_SAMPLE', {
    what: `frame ${frame} of the channel ${channelName(index)} is no number`,
    offset: dataOffset + frame * format.blockAlign + (index * format.containerBits) / 8,
    found: String(sample),
    remedy:
      'The program that wrote the file has a fault: export again, or cut the recording before this frame.',
  });
}

/** Looks for the first frame, then the first channel, that is NaN or ±Infinity. */
function checkFinite(channels: readonly Float64Array[], place: FramePlace, fromFrame: number): void {
  let firstFrame = Infinity;
  let firstIndex = -1;
  channels.forEach((samples, index) => {
    const frame = findNonFinite(samples);
    if (frame >= 0 && frame < firstFrame) {
      firstFrame = frame;
      firstIndex = index;
    }
  });
  if (firstIndex >= 0) {
    throw nonFiniteError(place, fromFrame + firstFrame, firstIndex, channels[firstIndex][firstFrame]);
  }
}

/**
 * Reads a run of frames from a file whose header has been read.
 *
 * @param file - the file's bytes
 * @param place - where its frames stand
 * @param fromFrame - first frame, 0 ≤ fromFrame ≤ frameCount
 * @param count - frames wanted; fewer come back only at the end
 * @returns new arrays, one a channel; linear, ±1.0 = digital full scale
 * @throws DspInputError `NON_FINITE_SAMPLE` at the first NaN or ±Infinity of a float file, `OUT_OF_RANGE`,
 *   `WAV_CHANGED_WHILE_READ`
 */
export async function readFrames(
  file: RandomAccessBytes,
  place: FramePlace,
  fromFrame: number,
  count: number,
): Promise<Float64Array[]> {
  const { format, dataOffset, frameCount } = place;
  const present = countFramesInRun(frameCount, fromFrame, count);
  const channels = Array.from({ length: format.channelCount }, () => new Float64Array(present));
  const blockFrames = Math.max(1, Math.floor(BLOCK_BYTES / format.blockAlign));
  for (let done = 0; done < present; done += blockFrames) {
    const offset = dataOffset + (fromFrame + done) * format.blockAlign;
    const length = Math.min(blockFrames, present - done) * format.blockAlign;
    decodeSamples(await readExactly(file, offset, length), format, channels, done);
  }
  if (format.sampleFormat === 'float') {
    checkFinite(channels, place, fromFrame);
  }
  return channels;
}
