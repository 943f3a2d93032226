import { sha256 } from '@noble/hashes/sha2';
import { bytesToHex } from '@noble/hashes/utils';
import {
  createStimulus,
  DspInputError,
  encodeWavBlocks,
  type StimulusDescriptor,
  type StimulusOptions,
} from '@benchlark/dsp';

export interface WrittenStimulus {
  readonly wav: Blob;
  readonly descriptor: StimulusDescriptor;
}

export interface WriteHooks {
  /** Told the share of the file that is written. */
  readonly onProgress: (share: number) => void;
  /** Asked between blocks. */
  readonly isCancelled: () => boolean;
}

/** Blocks are handed to the browser's own keeping in pieces of this size, so that none of a long file stays on the heap. */
const PIECE_BYTES = 8 * 1024 * 1024;

/** How much is written before the worker hears what the page has said meanwhile. */
const UNHEARD_BYTES = 1024 * 1024;

/** Lets waiting messages in: awaiting what is already there would never leave room for a stop. */
function hearMessages(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, 0));
}

/**
 * Writes a stimulus as a WAV file, block by block, with its descriptor.
 *
 * @throws DspInputError `CANCELLED`; naming the parameter that can't be
 */
export async function writeStimulus(
  name: string,
  options: StimulusOptions,
  { onProgress, isCancelled }: WriteHooks,
): Promise<WrittenStimulus> {
  const stimulus = createStimulus(name, options);
  const { source, encoding } = stimulus;
  const hash = sha256.create();
  const pieces: Blob[] = [];
  let blocks: Uint8Array<ArrayBuffer>[] = [];
  let [held, done, heardAt] = [0, 0, 0];
  const bytesPerSample = encoding.bits === '32f' ? 4 : encoding.bits / 8;
  const total = source.frameCount * source.channelCount * bytesPerSample;
  for await (const block of encodeWavBlocks(source, encoding)) {
    if (done - heardAt >= UNHEARD_BYTES) {
      await hearMessages();
      heardAt = done;
    }
    if (isCancelled()) throw new DspInputError('CANCELLED', 'the file was not written');
    hash.update(block);
    blocks.push(new Uint8Array(block));
    held += block.length;
    done += block.length;
    if (held >= PIECE_BYTES) {
      pieces.push(new Blob(blocks));
      [blocks, held] = [[], 0];
    }
    onProgress(Math.min(1, done / total));
  }
  const wav = new Blob([...pieces, ...blocks], { type: 'audio/wav' });
  return { wav, descriptor: stimulus.describe(bytesToHex(hash.digest())) };
}
