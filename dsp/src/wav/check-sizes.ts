import { makeWarning } from '../record/make-warning.js';
import type { Warning } from '../record/record.js';
import type { FileWindow } from './file-window.js';
import { byteCount, viewOf } from './little-endian.js';
import { isPlaceholderSize, SIZE_ELSEWHERE } from './read-sizes.js';
import type { StatedFormat } from './read-format.js';
import { type ChunkScan, isOpenEnded, type ScannedChunk } from './scan-chunks.js';
import type { WavContainer } from './wav-file.js';

/** What is known of a file once its chunks have been walked over and its format read. */
export interface ReadHeader {
  readonly container: WavContainer;
  readonly scan: ChunkScan;
  readonly stated: StatedFormat;
  /** Where the content of the fmt chunk begins. */
  readonly formatOffset: number;
  readonly data: ScannedChunk;
}

function checkDataSize({ data, stated, scan }: ReadHeader): Warning[] {
  const warnings: Warning[] = [];
  const declared = byteCount(data.declaredBytes);
  const present = byteCount(data.sizeBytes);
  if (isOpenEnded(data)) {
    warnings.push(makeWarning('size-not-set', { declared, present }));
  } else if (data.sizeBytes < data.declaredBytes) {
    warnings.push(
      makeWarning('file-size-lies', { declared: `${declared} of samples`, present: `${present} of them` }),
    );
  }
  const rest = data.sizeBytes % stated.format.blockAlign;
  if (rest > 0) {
    const offset = data.offset + data.sizeBytes - rest;
    warnings.push(makeWarning('last-frame-cut', { bytes: byteCount(rest), offset }));
  }
  const second = scan.chunks.find((chunk) => chunk.id === 'data' && chunk !== data);
  if (second !== undefined) {
    warnings.push(makeWarning('second-data-chunk', { offset: second.offset - 8, measured: data.offset - 8 }));
  }
  return warnings;
}

/** Compares what the outermost head says with the file's length; one byte of padding more or less is nothing. */
async function checkRiffSize(file: FileWindow, scan: ChunkScan): Promise<Warning[]> {
  const stated = viewOf(await file.peek(4, 4)).getUint32(0, true);
  const declared = (stated === SIZE_ELSEWHERE ? (scan.wideSizes?.riffBytes ?? stated) : stated) + 8;
  const isKept = isPlaceholderSize(declared - 8) || Math.abs(declared - file.sizeBytes) <= 1;
  return isKept
    ? []
    : [makeWarning('riff-size-wrong', { declared: byteCount(declared), present: byteCount(file.sizeBytes) })];
}

/** Compares the frames counted by `fact` and `ds64`, where they know, with those that are there. */
async function checkFrameCounts(file: FileWindow, header: ReadHeader): Promise<Warning[]> {
  const { scan, data, stated } = header;
  const present = Math.floor(data.sizeBytes / stated.format.blockAlign);
  const fact = scan.chunks.find((chunk) => chunk.id === 'fact' && chunk.sizeBytes >= 4);
  const counts = [{ chunk: 'ds64', declared: scan.wideSizes?.frameCount ?? 0 }];
  if (fact !== undefined) {
    counts.push({ chunk: 'fact', declared: viewOf(await file.peek(fact.offset, 4)).getUint32(0, true) });
  }
  return counts
    .filter(({ declared }) => declared !== present && declared !== 0 && declared !== SIZE_ELSEWHERE)
    .map(({ chunk, declared }) => makeWarning('frame-count-differs', { chunk, declared, present }));
}

/**
 * Compares the sizes and counts that a header states with each other and with the file.
 *
 * @returns a warning for each that is wrong and was overcome
 */
export async function checkSizes(file: FileWindow, header: ReadHeader): Promise<Warning[]> {
  const { scan, stated, container, formatOffset } = header;
  const warnings = checkDataSize(header);
  if (container !== 'RIFF' && scan.wideSizes === null) {
    warnings.push(makeWarning('size-table-missing', { container }));
  }
  // A file that was cut off has every other count wrong too: one warning says it.
  if (header.data.sizeBytes === header.data.declaredBytes) {
    warnings.push(...(await checkRiffSize(file, scan)), ...(await checkFrameCounts(file, header)));
  }
  const byteRate = stated.format.sampleRateHz * stated.format.blockAlign;
  if (stated.byteRate !== byteRate) {
    warnings.push(
      makeWarning('byte-rate-wrong', {
        found: stated.byteRate,
        offset: formatOffset + 8,
        expected: byteRate,
      }),
    );
  }
  return warnings;
}
