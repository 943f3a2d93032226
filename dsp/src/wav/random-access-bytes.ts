import { DspInputError } from '../errors.js';

/** Bytes that can be read at any place: a file on a disk, a Blob, memory. */
export interface RandomAccessBytes {
  readonly sizeBytes: number;
  /**
   * Reads a run of bytes. Several reads may be under way at once.
   *
   * @param offset - first byte
   * @param length - bytes wanted; offset + length is at most `sizeBytes`
   * @returns the bytes; a reader neither changes nor keeps them, so a view of memory will do. Fewer than wanted say
   *   that the file has become shorter.
   */
  read(offset: number, length: number): Promise<Uint8Array>;
}

/** What this module uses of a Blob or a File. */
export interface BlobLike {
  readonly size: number;
  slice(from: number, to: number): { arrayBuffer(): Promise<ArrayBuffer> };
}

/** Reads bytes that are in memory; reads are views, nothing is copied. */
export function bytesFromMemory(bytes: Uint8Array): RandomAccessBytes {
  return {
    sizeBytes: bytes.length,
    read: (offset, length) => Promise.resolve(bytes.subarray(offset, offset + length)),
  };
}

/** Reads a Blob or a File piece by piece, so that a file of any size needs no more memory than a block. */
export function bytesFromBlob(blob: BlobLike): RandomAccessBytes {
  return {
    sizeBytes: blob.size,
    read: async (offset, length) => new Uint8Array(await blob.slice(offset, offset + length).arrayBuffer()),
  };
}

/**
 * Reads exactly the bytes asked for.
 *
 * @throws DspInputError `WAV_CHANGED_WHILE_READ` when fewer come than the file's size promised
 */
export async function readExactly(
  file: RandomAccessBytes,
  offset: number,
  length: number,
): Promise<Uint8Array> {
  const bytes = await file.read(offset, length);
  if (bytes.length !== length) {
    throw new DspInputError(
      'WAV_CHANGED_WHILE_READ',
      `the file ended at byte ${offset + bytes.length} while it was being read, and it had ${file.sizeBytes} bytes before`,
      {
        offset: offset + bytes.length,
        found: `${bytes.length} of ${length} bytes`,
        remedy: 'Wait until the recorder or the copy has finished, then try again.',
      },
    );
  }
  return bytes;
}
