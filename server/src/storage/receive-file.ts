import { createHash, randomUUID } from 'node:crypto';
import { open, unlink } from 'node:fs/promises';
import { join } from 'node:path';
import type { Readable } from 'node:stream';

export interface ReceivedFile {
  readonly path: string;
  readonly sha256: string;
  readonly sizeBytes: number;
}

/** What a file that is still arriving is called; the sweep knows it by this. */
export const PART_ENDING = '.part';

/** Removes a file; one that is gone already is no error. */
export async function removeFile(path: string): Promise<void> {
  try {
    await unlink(path);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
  }
}

/**
 * Writes a stream to a new file in the folder, hashing on the way, and syncs it.
 *
 * @param signal - ends the reception early
 * @throws whatever the stream or the disk throws; the file is gone then
 */
export async function receiveFile(
  bytes: Readable,
  folder: string,
  signal?: AbortSignal,
): Promise<ReceivedFile> {
  const path = join(folder, `${randomUUID()}${PART_ENDING}`);
  const hash = createHash('sha256');
  let sizeBytes = 0;
  const handle = await open(path, 'wx', 0o600);
  const stop = () =>
    bytes.destroy(signal?.reason instanceof Error ? signal.reason : new Error('reception ended'));
  signal?.addEventListener('abort', stop, { once: true });
  if (signal?.aborted) stop();
  try {
    for await (const chunk of bytes as AsyncIterable<Buffer>) {
      hash.update(chunk);
      await writeWhole(handle, chunk);
      sizeBytes += chunk.length;
    }
    await handle.sync();
    await handle.close();
    return { path, sha256: hash.digest('hex'), sizeBytes };
  } catch (error) {
    await handle.close();
    await removeFile(path);
    throw error;
  } finally {
    signal?.removeEventListener('abort', stop);
  }
}

/** write(2) may take less than it was given, e.g. just before a disk is full. */
async function writeWhole(handle: Awaited<ReturnType<typeof open>>, chunk: Buffer): Promise<void> {
  let done = 0;
  while (done < chunk.length) {
    const { bytesWritten } = await handle.write(chunk, done, chunk.length - done);
    done += bytesWritten;
  }
}
