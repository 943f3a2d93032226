import { DspInputError } from '../errors.js';
import { makeWarning } from '../record/make-warning.js';
import type { Warning } from '../record/record.js';
import { BEXT_FIXED_BYTES, type BroadcastExtension } from './broadcast-extension.js';
import { checkSizes } from './check-sizes.js';
import { type FileWindow, openFileWindow } from './file-window.js';
import { identifyContainer } from './identify-container.js';
import { byteCount, fourLetters, hexOf } from './little-endian.js';
import type { RandomAccessBytes } from './random-access-bytes.js';
import { readBroadcastExtension } from './read-broadcast-extension.js';
import { readFormat, type StatedFormat } from './read-format.js';
import { readFrames } from './read-frames.js';
import { refuseWav } from './refuse-wav.js';
import { type ChunkScan, MOST_CHUNKS, type ScannedChunk, scanChunks } from './scan-chunks.js';
import type { WavContainer, WavFile } from './wav-file.js';

const CONTAINERS: readonly WavContainer[] = ['RIFF', 'RF64', 'BW64'];

/** A fmt chunk has 40 bytes at most in the formats read here; of a longer one the rest says nothing. */
const FORMAT_MOST_BYTES = 64;
/** Of a coding history that goes on for ever this much is kept. */
const BEXT_MOST_BYTES = BEXT_FIXED_BYTES + 8192;

const CHOOSE_WAV = 'Choose the recording itself: a WAV file (PCM or float).';
const COPY_AGAIN = 'Copy the file from the recorder again; if it stays so, it was cut off: record again.';

async function readContainer(file: FileWindow): Promise<WavContainer> {
  const head = await file.peek(0, 64);
  if (head.length === 0) {
    throw refuseWav('WAV_EMPTY_FILE', {
      what: 'the file is empty',
      offset: 0,
      found: '0 bytes',
      remedy: COPY_AGAIN,
    });
  }
  const container = CONTAINERS.find((name) => name === fourLetters(head));
  if (container !== undefined && fourLetters(head, 8) === 'WAVE') {
    return container;
  }
  if (container !== undefined && head.length < 12) {
    throw refuseWav('WAV_TRUNCATED_HEADER', {
      what: 'the file ends inside its first 12 bytes',
      offset: head.length,
      found: `${byteCount(head.length)} in all`,
      remedy: COPY_AGAIN,
    });
  }
  const other = identifyContainer(head);
  if (other !== null) {
    throw refuseWav('WAV_OTHER_CONTAINER', {
      what: `the file is not WAV but ${other.name}`,
      offset: fourLetters(head) === 'RIFF' ? 8 : 0,
      found: hexOf(head.subarray(0, 12)),
      remedy: other.remedy,
    });
  }
  throw refuseWav('WAV_NOT_RIFF', {
    what: 'the file is not WAV: it must begin with RIFF, RF64 or BW64, and WAVE at byte 8',
    offset: container === undefined ? 0 : 8,
    found: hexOf(head.subarray(0, 12)),
    remedy: CHOOSE_WAV,
  });
}

/** Says where a chunk that is missing could have got lost: behind a size that lies, or where the chunks break off. */
function missingChunk(scan: ChunkScan, sizeBytes: number, id: 'fmt ' | 'data'): DspInputError {
  if (scan.hasTooMany) {
    return refuseWav('WAV_TOO_MANY_CHUNKS', {
      what: `the file has no "${id}" among its first ${MOST_CHUNKS} chunks`,
      offset: scan.endOffset,
      found: 'more chunks',
      remedy: 'Export the recording again as plain WAV.',
    });
  }
  const last = scan.chunks.at(-1);
  const isOverrun = last !== undefined && last.declaredBytes > last.sizeBytes;
  const names = scan.chunks.slice(0, 12).map((chunk) => `"${chunk.id}"`);
  const found = names.length === 0 ? 'no chunks' : `the chunks ${names.join(', ')}`;
  const overrun = isOverrun
    ? `; "${last.id}" claims ${byteCount(last.declaredBytes)}, and the file has ${byteCount(last.sizeBytes)} left`
    : '';
  const code = id === 'data' ? 'WAV_DATA_MISSING' : 'WAV_FORMAT_MISSING';
  return refuseWav(code, {
    what:
      id === 'data' ? 'the file has no data chunk, so no samples' : 'the file has no fmt chunk, so no format',
    offset: isOverrun ? last.offset - 8 : Math.min(scan.endOffset, sizeBytes),
    found: found + overrun,
    remedy: COPY_AGAIN,
  });
}

async function readStatedFormat(
  file: FileWindow,
  scan: ChunkScan,
): Promise<StatedFormat & { at: ScannedChunk }> {
  const all = scan.chunks.filter((chunk) => chunk.id === 'fmt ');
  const first = all.at(0);
  if (first === undefined) {
    throw missingChunk(scan, file.sizeBytes, 'fmt ');
  }
  if (first.sizeBytes < first.declaredBytes) {
    throw refuseWav('WAV_TRUNCATED_HEADER', {
      what: 'the file ends inside its fmt chunk',
      offset: first.offset + first.sizeBytes,
      found: `${first.sizeBytes} of ${byteCount(first.declaredBytes)}`,
      remedy: COPY_AGAIN,
    });
  }
  const contentOf = async (chunk: ScannedChunk): Promise<Uint8Array> =>
    (await file.peek(chunk.offset, Math.min(chunk.sizeBytes, FORMAT_MOST_BYTES))).slice();
  const content = await contentOf(first);
  for (const other of all.slice(1)) {
    const otherContent = await contentOf(other);
    if (hexOf(otherContent) !== hexOf(content)) {
      throw refuseWav('WAV_FORMAT_CONTRADICTORY', {
        what: `the file has two fmt chunks that differ, the first at byte ${first.offset - 8}`,
        offset: other.offset - 8,
        found: hexOf(otherContent.subarray(0, 16)),
        remedy: 'Export the recording again as plain WAV.',
      });
    }
  }
  return { ...readFormat(content, first.offset), at: first };
}

/** Takes the first data chunk that holds something, and makes sure that it holds a whole frame. */
function chooseData(scan: ChunkScan, sizeBytes: number, blockAlign: number): ScannedChunk {
  const all = scan.chunks.filter((chunk) => chunk.id === 'data');
  const data = all.find((chunk) => chunk.sizeBytes > 0) ?? all.at(0);
  if (data === undefined) {
    throw missingChunk(scan, sizeBytes, 'data');
  }
  if (data.sizeBytes < blockAlign) {
    throw refuseWav('WAV_DATA_EMPTY', {
      what: 'the data chunk holds no whole frame',
      offset: data.offset,
      found: `${byteCount(data.sizeBytes)}, and a frame has ${blockAlign}`,
      remedy: 'The recording was stopped before it began: record again.',
    });
  }
  return data;
}

async function readBroadcast(
  file: FileWindow,
  scan: ChunkScan,
  warnings: Warning[],
): Promise<BroadcastExtension | null> {
  const chunk = scan.chunks.find(({ id }) => id === 'bext');
  if (chunk === undefined || chunk.sizeBytes < chunk.declaredBytes) {
    return null; // a chunk that was cut short has its warning already
  }
  if (chunk.sizeBytes < BEXT_FIXED_BYTES) {
    const present = byteCount(chunk.sizeBytes);
    const expected = byteCount(BEXT_FIXED_BYTES);
    warnings.push(
      makeWarning('chunk-malformed', { chunk: '"bext"', offset: chunk.offset - 8, present, expected }),
    );
    return null;
  }
  return readBroadcastExtension(await file.peek(chunk.offset, Math.min(chunk.sizeBytes, BEXT_MOST_BYTES)));
}

/**
 * Opens a WAV file: reads its header and chunks, not its samples.
 *
 * Accepts RIFF, RF64 and BW64 with 8, 16, 24 and 32-bit PCM, 32 and 64-bit float, plain or WAVE_FORMAT_EXTENSIBLE, 1 to
 * 32 channels, 1 kHz to 1.536 MHz, chunks in any order. Files that were cut off or whose sizes are wrong open with a
 * warning and as many whole frames as there are. Of several data chunks the first that isn't empty counts.
 *
 * @param file - the file's bytes
 * @returns the file as a source of samples, with its format, chunks, `bext` texts and warnings
 * @throws DspInputError with `details.offset`, `found` and `remedy`: `WAV_EMPTY_FILE`, `WAV_NOT_RIFF`,
 *   `WAV_OTHER_CONTAINER`, `WAV_TRUNCATED_HEADER`, `WAV_FORMAT_MISSING`, `WAV_FORMAT_CONTRADICTORY`,
 *   `WAV_COMPRESSED`, `WAV_BAD_…`, `WAV_DATA_MISSING`, `WAV_DATA_EMPTY`, `WAV_TOO_MANY_CHUNKS`,
 *   `WAV_CHANGED_WHILE_READ`; reading its samples throws `NON_FINITE_SAMPLE`
 * @see Microsoft and IBM, "Multimedia Programming Interface and Data Specifications 1.0" (1991); EBU Tech 3285, 3306;
 *   ITU-R BS.2088
 */
export async function openWav(file: RandomAccessBytes): Promise<WavFile> {
  const head = openFileWindow(file);
  const container = await readContainer(head);
  const scan = await scanChunks(head, container);
  const stated = await readStatedFormat(head, scan);
  const { format } = stated;
  const data = chooseData(scan, file.sizeBytes, format.blockAlign);
  const frameCount = Math.floor(data.sizeBytes / format.blockAlign);
  const header = { container, scan, stated, formatOffset: stated.at.offset, data };
  const warnings = [...(await checkSizes(head, header)), ...scan.warnings];
  const broadcast = await readBroadcast(head, scan, warnings);
  const place = { format, dataOffset: data.offset, frameCount };
  return {
    sampleRateHz: format.sampleRateHz,
    channelCount: format.channelCount,
    frameCount,
    container,
    format,
    dataOffset: data.offset,
    dataSizeBytes: frameCount * format.blockAlign,
    chunks: scan.chunks.map(({ id, offset, sizeBytes }) => ({ id, offset, sizeBytes })),
    broadcast,
    warnings,
    read: (fromFrame, count) => readFrames(file, place, fromFrame, count),
  };
}
