import { type RandomAccessBytes, readExactly } from './random-access-bytes.js';

/** One look at the file fetches this much, so that a row of small chunks needs one read and not one each. */
const WINDOW_BYTES = 16_384;

/** Reads short runs of a file through a window that moves along with them. */
export interface FileWindow {
  readonly sizeBytes: number;
  /** @returns the bytes from `offset` on; fewer than `length`, or none, where the file ends */
  peek(offset: number, length: number): Promise<Uint8Array>;
}

export function openFileWindow(file: RandomAccessBytes): FileWindow {
  let from = 0;
  let held = new Uint8Array();
  return {
    sizeBytes: file.sizeBytes,
    peek: async (offset, length) => {
      const wanted = Math.max(0, Math.min(length, file.sizeBytes - offset));
      if (offset < from || offset + wanted > from + held.length) {
        const size = Math.min(Math.max(wanted, WINDOW_BYTES), Math.max(0, file.sizeBytes - offset));
        held = new Uint8Array(await readExactly(file, offset, size));
        from = offset;
      }
      return held.subarray(offset - from, offset - from + wanted);
    },
  };
}
