import { fourLetters, viewOf } from './little-endian.js';

/** What a `ds64` chunk says of sizes that don't fit into 32 bits. */
export interface WideSizes {
  readonly riffBytes: number;
  readonly dataBytes: number;
  /** Frames, as the `fact` chunk would count them. */
  readonly frameCount: number;
  /** Sizes of other chunks, by name. */
  readonly table: ReadonlyMap<string, number>;
}

/** In a 32-bit size: look into ds64, or, in plain RIFF, unknown. */
export const SIZE_ELSEWHERE = 0xffffffff;

const FIXED_BYTES = 28;
const ENTRY_BYTES = 12;

/** Bytes of `ds64` that are looked at: the fixed part and a table of some hundred entries. */
export const DS64_MOST_BYTES = 4096;

/**
 * Reads the content of a `ds64` chunk.
 *
 * @param bytes - the content, or its first `DS64_MOST_BYTES`; not modified
 * @returns the sizes (a value beyond 2^53 loses its last digits, and no file is that long), or null below 24 bytes
 * @see EBU Tech 3306, ITU-R BS.2088: u64 riffSize, u64 dataSize, u64 sampleCount, u32 tableLength, then the table
 */
export function readWideSizes(bytes: Uint8Array): WideSizes | null {
  if (bytes.length < FIXED_BYTES - 4) {
    return null;
  }
  const view = viewOf(bytes);
  const wide = (offset: number): number => Number(view.getBigUint64(offset, true));
  const table = new Map<string, number>();
  const claimed = bytes.length >= FIXED_BYTES ? view.getUint32(FIXED_BYTES - 4, true) : 0;
  const entries = Math.min(claimed, Math.floor((bytes.length - FIXED_BYTES) / ENTRY_BYTES));
  for (let n = 0; n < entries; n++) {
    const offset = FIXED_BYTES + n * ENTRY_BYTES;
    table.set(fourLetters(bytes, offset), wide(offset + 4));
  }
  return { riffBytes: wide(0), dataBytes: wide(8), frameCount: wide(16), table };
}

/**
 * Tells whether a size of the data or RIFF chunk is what a writer puts there that doesn't know it yet: 0, all ones, or
 * just below 2^31, as programs that write to a pipe do (common practice, no source).
 */
export function isPlaceholderSize(sizeBytes: number): boolean {
  return (
    sizeBytes === 0 || sizeBytes === SIZE_ELSEWHERE || (sizeBytes >= 0x7fff0000 && sizeBytes <= 0x80000000)
  );
}
