import { makeWarning } from '../record/make-warning.js';
import type { Warning } from '../record/record.js';
import type { FileWindow } from './file-window.js';
import { byteCount, fourLetters, viewOf } from './little-endian.js';
import {
  DS64_MOST_BYTES,
  isPlaceholderSize,
  readWideSizes,
  SIZE_ELSEWHERE,
  type WideSizes,
} from './read-sizes.js';
import type { WavChunk, WavContainer } from './wav-file.js';

/** A chunk and the size its head states, which may be a placeholder or a lie. */
export interface ScannedChunk extends WavChunk {
  readonly declaredBytes: number;
}

export interface ChunkScan {
  readonly chunks: readonly ScannedChunk[];
  readonly wideSizes: WideSizes | null;
  readonly warnings: readonly Warning[];
  /** Where the row of chunks ended: at the end of the file, or where no chunk could follow. */
  readonly endOffset: number;
  readonly hasTooMany: boolean;
}

/** Real files have a few dozen; a file of nothing but heads must not keep anybody busy. */
export const MOST_CHUNKS = 1024;

const HEAD_BYTES = 8;
const FIRST_CHUNK = 12;

const KNOWN_IDS: ReadonlySet<string> = new Set(
  'fmt |data|fact|LIST|bext|JUNK|junk|FLLR|PAD |ds64|iXML|axml|bxml|sxml|chna|cue |plst|smpl|inst|cart|levl|link|umid|MD5 |DISP|ID3 |id3 |PEAK|wavl|slnt|acid|strc|afsp|_PMX|minf|elm1|regn|qlty|ubxt'.split(
    '|',
  ),
);

/** Four printable letters: what a chunk's name must be to be believed. */
const isName = (id: string): boolean => /^[ -~]{4}$/.test(id);

interface Head {
  readonly id: string;
  readonly declaredBytes: number;
}

async function readHead(file: FileWindow, offset: number): Promise<Head | null> {
  const bytes = await file.peek(offset, HEAD_BYTES);
  return bytes.length < HEAD_BYTES
    ? null
    : { id: fourLetters(bytes), declaredBytes: viewOf(bytes).getUint32(4, true) };
}

/**
 * Finds where the chunk after an odd-sized one begins. RIFF wants a pad byte there; some writers leave it out, and then
 * the name stands one byte earlier.
 */
async function skipPad(file: FileWindow, offset: number): Promise<number> {
  const padded = await readHead(file, offset + 1);
  const unpadded = await readHead(file, offset);
  if (unpadded === null || (padded !== null && KNOWN_IDS.has(padded.id))) {
    return offset + 1;
  }
  if (KNOWN_IDS.has(unpadded.id)) {
    return offset;
  }
  const fits = unpadded.declaredBytes <= file.sizeBytes - offset - HEAD_BYTES;
  return isName(unpadded.id) && fits && !(padded !== null && isName(padded.id)) ? offset : offset + 1;
}

/** Tells whether data of declared size 0 are really empty: another chunk that fits follows at once. */
async function isFollowedByChunk(file: FileWindow, offset: number): Promise<boolean> {
  const next = await readHead(file, offset);
  return (
    next !== null && KNOWN_IDS.has(next.id) && next.declaredBytes <= file.sizeBytes - offset - HEAD_BYTES
  );
}

/** The size a chunk claims: its own, or where that is all ones, the one that ds64 gives. */
function claimedBytes({ id, declaredBytes }: Head, wideSizes: WideSizes | null): number {
  if (declaredBytes !== SIZE_ELSEWHERE || wideSizes === null) {
    return declaredBytes;
  }
  return id === 'data' ? wideSizes.dataBytes : (wideSizes.table.get(id) ?? declaredBytes);
}

/** Says what of the row of chunks, and behind it, was not read. */
function warnOfUnread(chunks: readonly ScannedChunk[], endOffset: number, file: FileWindow): Warning[] {
  const warnings: Warning[] = [];
  if (endOffset < file.sizeBytes) {
    const rest = { offset: endOffset, present: byteCount(file.sizeBytes - endOffset), count: MOST_CHUNKS };
    warnings.push(makeWarning(chunks.length === MOST_CHUNKS ? 'too-many-chunks' : 'trailing-bytes', rest));
  }
  for (const chunk of chunks) {
    if (chunk.id !== 'data' && chunk.declaredBytes > chunk.sizeBytes) {
      const declared = byteCount(chunk.declaredBytes);
      const present = byteCount(chunk.sizeBytes);
      const about = { chunk: `"${chunk.id}"`, offset: chunk.offset - HEAD_BYTES, declared, present };
      warnings.push(makeWarning('chunk-cut-short', about));
    }
  }
  return warnings;
}

/**
 * Walks over the chunks of a file without reading their content. A size is never believed beyond the end of the file.
 * Data of a placeholder's size reach to the end of the file.
 *
 * @param file - looked at from byte 12 on
 * @param container - in RF64 and BW64, `ds64` gives the sizes that are all ones
 */
export async function scanChunks(file: FileWindow, container: WavContainer): Promise<ChunkScan> {
  const chunks: ScannedChunk[] = [];
  const warnings: Warning[] = [];
  let wideSizes: WideSizes | null = null;
  let next = FIRST_CHUNK;
  while (chunks.length < MOST_CHUNKS) {
    const head = await readHead(file, next);
    if (head === null || !isName(head.id)) {
      break;
    }
    const offset = next + HEAD_BYTES;
    const left = file.sizeBytes - offset;
    const declaredBytes = claimedBytes(head, wideSizes);
    const isUnset = head.id === 'data' && declaredBytes === 0 && !(await isFollowedByChunk(file, offset));
    const sizeBytes = isUnset ? left : Math.min(declaredBytes, left);
    chunks.push({ id: head.id, offset, sizeBytes, declaredBytes });
    if (container !== 'RIFF' && head.id === 'ds64' && wideSizes === null) {
      wideSizes = readWideSizes(await file.peek(offset, Math.min(sizeBytes, DS64_MOST_BYTES)));
    }
    const end = offset + sizeBytes;
    next = sizeBytes % 2 === 1 ? await skipPad(file, end) : end;
    if (sizeBytes % 2 === 1 && next === end) {
      warnings.push(makeWarning('pad-byte-missing', { chunk: `"${head.id}"`, offset: offset - HEAD_BYTES }));
    }
  }
  const endOffset = Math.min(next, file.sizeBytes);
  const hasTooMany = chunks.length === MOST_CHUNKS && endOffset < file.sizeBytes;
  warnings.push(...warnOfUnread(chunks, endOffset, file));
  return { chunks, wideSizes, warnings, endOffset, hasTooMany };
}

/** True when a data chunk's length had to be taken from the file's. */
export function isOpenEnded(chunk: ScannedChunk): boolean {
  return chunk.sizeBytes !== chunk.declaredBytes && isPlaceholderSize(chunk.declaredBytes);
}
