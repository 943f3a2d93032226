import { open } from 'node:fs/promises';
import type { RandomAccessBytes } from '@benchlark/dsp';

export interface FileBytes extends RandomAccessBytes {
  close(): Promise<void>;
}

/** A file on this machine's disk as dsp reads it: any place, any number of reads at once. */
export async function openFileBytes(path: string): Promise<FileBytes> {
  const handle = await open(path, 'r');
  const { size } = await handle.stat();
  return {
    sizeBytes: size,
    async read(offset, length) {
      const bytes = Buffer.allocUnsafe(length);
      let done = 0;
      while (done < length) {
        const { bytesRead } = await handle.read(bytes, done, length - done, offset + done);
        if (bytesRead === 0) break;
        done += bytesRead;
      }
      return bytes.subarray(0, done);
    },
    close: () => handle.close(),
  };
}
