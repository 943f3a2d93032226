import { hexOf, viewOf } from './little-endian.js';
import { FORMAT_TAG_EXTENSIBLE, FORMAT_TAG_FLOAT, FORMAT_TAG_PCM, nameFormatTag } from './name-format-tag.js';
import { refuseWav } from './refuse-wav.js';
import type { WavFormat } from './wav-file.js';

export const MOST_CHANNELS = 32;
export const LOWEST_RATE_HZ = 1000;
export const HIGHEST_RATE_HZ = 1_536_000;

const PLAIN_BYTES = 16;
const EXTENSIBLE_BYTES = 40;
/** Bytes 2 to 15 of every sub-format GUID that carries a format tag in bytes 0 and 1 (Microsoft, mmreg.h). */
const SUBFORMAT_TAIL = '00 00 00 00 10 00 80 00 00 aa 00 38 9b 71';

const EXPORT_AGAIN = 'Export the recording again as WAV (PCM or float) from the program that made it.';
const RECORD_UNCOMPRESSED =
  'Record or export again as PCM or float: a compressed recording can not be measured.';

/** A fmt chunk's format and the byte rate it states, which nothing depends on. */
export interface StatedFormat {
  readonly format: WavFormat;
  readonly byteRate: number;
}

interface SampleKind {
  readonly tag: number;
  readonly validBits: number;
  readonly channelMask: number | null;
}

/** Reads tag and valid bits, from the extension where the format is WAVE_FORMAT_EXTENSIBLE. */
function readKind(bytes: Uint8Array, offset: number): SampleKind {
  const view = viewOf(bytes);
  const tag = view.getUint16(0, true);
  const bits = view.getUint16(14, true);
  if (tag !== FORMAT_TAG_EXTENSIBLE) {
    return { tag, validBits: bits, channelMask: null };
  }
  const extensionBytes = bytes.length >= 18 ? view.getUint16(16, true) : 0;
  if (bytes.length < EXTENSIBLE_BYTES || extensionBytes < 22) {
    throw refuseWav('WAV_FORMAT_CONTRADICTORY', {
      what: 'the fmt chunk is WAVE_FORMAT_EXTENSIBLE without its extension of 22 bytes',
      offset: offset + 16,
      found: `a chunk of ${bytes.length} bytes with an extension of ${extensionBytes}`,
      remedy: EXPORT_AGAIN,
    });
  }
  const guid = bytes.subarray(24, 40);
  if (hexOf(guid.subarray(2)) !== SUBFORMAT_TAIL) {
    throw refuseWav('WAV_COMPRESSED', {
      what: 'the sub-format is neither PCM nor float',
      offset: offset + 24,
      found: hexOf(guid),
      remedy: RECORD_UNCOMPRESSED,
    });
  }
  // Writers leave the valid bits 0 where they mean the whole container.
  const validBits = view.getUint16(18, true) || bits;
  return { tag: view.getUint16(24, true), validBits, channelMask: view.getUint32(20, true) };
}

function checkRange(value: number, low: number, high: number, fault: () => Error): void {
  if (value < low || value > high) {
    throw fault();
  }
}

/** Says how many bits a sample takes in the file, and refuses bit depths that can't be. */
function readContainerBits(bytes: Uint8Array, offset: number, kind: SampleKind): number {
  const bits = viewOf(bytes).getUint16(14, true);
  const isExtensible = kind.channelMask !== null;
  // A plain fmt chunk gives the valid bits, in the fewest whole bytes, at the upper end (Microsoft/IBM, 1991).
  const containerBits = isExtensible || kind.tag === FORMAT_TAG_FLOAT ? bits : Math.ceil(bits / 8) * 8;
  const isKnown = kind.tag === FORMAT_TAG_FLOAT ? [32, 64].includes(bits) : bits >= 8 && containerBits <= 32;
  if (!isKnown || containerBits % 8 !== 0) {
    throw refuseWav('WAV_BAD_BIT_DEPTH', {
      what: `a sample of ${bits} bits can't be read`,
      offset: offset + 14,
      found: `${bits} bits, ${kind.tag === FORMAT_TAG_FLOAT ? 'float' : 'PCM'}`,
      remedy: 'Export as 16, 24 or 32-bit PCM or as 32-bit float.',
    });
  }
  if (kind.validBits > containerBits) {
    throw refuseWav('WAV_FORMAT_CONTRADICTORY', {
      what: `a sample can't have more valid bits than it takes in the file`,
      offset: offset + 18,
      found: `${kind.validBits} valid bits in ${containerBits}`,
      remedy: EXPORT_AGAIN,
    });
  }
  checkRange(kind.validBits, 8, 64, () =>
    refuseWav('WAV_BAD_BIT_DEPTH', {
      what: 'a sample needs 8 valid bits or more',
      offset: offset + 18,
      found: `${kind.validBits} valid bits`,
      remedy: EXPORT_AGAIN,
    }),
  );
  return containerBits;
}

function readChannelCount(view: DataView, offset: number): number {
  const channelCount = view.getUint16(2, true);
  checkRange(channelCount, 1, MOST_CHANNELS, () =>
    refuseWav('WAV_BAD_CHANNEL_COUNT', {
      what: `the file must have 1 to ${MOST_CHANNELS} channels`,
      offset: offset + 2,
      found: `${channelCount} channels`,
      remedy: channelCount === 0 ? EXPORT_AGAIN : 'Export the channels under test alone.',
    }),
  );
  return channelCount;
}

function readSampleRate(view: DataView, offset: number): number {
  const sampleRateHz = view.getUint32(4, true);
  checkRange(sampleRateHz, LOWEST_RATE_HZ, HIGHEST_RATE_HZ, () =>
    refuseWav('WAV_BAD_SAMPLE_RATE', {
      what: `the sample rate must lie between ${LOWEST_RATE_HZ} and ${HIGHEST_RATE_HZ} Hz`,
      offset: offset + 4,
      found: `${sampleRateHz} Hz`,
      remedy: EXPORT_AGAIN,
    }),
  );
  return sampleRateHz;
}

/**
 * Reads the content of a `fmt ` chunk.
 *
 * @param bytes - the content, whole; not modified
 * @param offset - where it begins in the file, for messages
 * @throws DspInputError `WAV_FORMAT_CONTRADICTORY`, `WAV_COMPRESSED`, `WAV_BAD_CHANNEL_COUNT`, `WAV_BAD_SAMPLE_RATE`,
 *   `WAV_BAD_BIT_DEPTH`, `WAV_BAD_BLOCK_ALIGN`, each with byte offset, what was found and what to do
 * @see Microsoft and IBM, "Multimedia Programming Interface and Data Specifications 1.0" (1991); Microsoft,
 *   WAVEFORMATEXTENSIBLE
 */
export function readFormat(bytes: Uint8Array, offset: number): StatedFormat {
  if (bytes.length < PLAIN_BYTES) {
    throw refuseWav('WAV_FORMAT_CONTRADICTORY', {
      what: `the fmt chunk is too short: it needs ${PLAIN_BYTES} bytes`,
      offset,
      found: `${bytes.length} bytes`,
      remedy: EXPORT_AGAIN,
    });
  }
  const view = viewOf(bytes);
  const kind = readKind(bytes, offset);
  const { tag, validBits, channelMask } = kind;
  const isExtensible = channelMask !== null;
  if (tag !== FORMAT_TAG_PCM && tag !== FORMAT_TAG_FLOAT) {
    throw refuseWav('WAV_COMPRESSED', {
      what: 'the samples are neither PCM nor float',
      offset: isExtensible ? offset + 24 : offset,
      found: nameFormatTag(tag),
      remedy: RECORD_UNCOMPRESSED,
    });
  }
  const channelCount = readChannelCount(view, offset);
  const sampleRateHz = readSampleRate(view, offset);
  const containerBits = readContainerBits(bytes, offset, kind);
  const blockAlign = view.getUint16(12, true);
  const expectedAlign = (channelCount * containerBits) / 8;
  if (blockAlign !== expectedAlign) {
    throw refuseWav('WAV_BAD_BLOCK_ALIGN', {
      what: `${channelCount} channels of ${containerBits} bits make frames of ${expectedAlign} bytes`,
      offset: offset + 12,
      found: `frames of ${blockAlign} bytes`,
      remedy: EXPORT_AGAIN,
    });
  }
  const format: WavFormat = {
    sampleFormat: tag === FORMAT_TAG_FLOAT ? 'float' : 'integer',
    sampleRateHz,
    channelCount,
    bitsPerSample: tag === FORMAT_TAG_FLOAT ? containerBits : validBits,
    containerBits,
    blockAlign,
    isExtensible,
    channelMask,
  };
  return { format, byteRate: view.getUint32(8, true) };
}
