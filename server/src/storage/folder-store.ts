import { access, constants, mkdir, open, opendir, readFile, rename, stat, statfs } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import type { Readable } from 'node:stream';
import {
  assertSha256,
  isSha256,
  ObjectMissingError,
  ObjectStore,
  StorageNotReadyError,
  type ByteRange,
  type ListedObject,
  type LocalCopy,
  type ObjectFacts,
} from './object-store';
import { receiveFile, removeFile } from './receive-file';
import { syncFolder, writeMarker } from './folder-marker';

export const MARKER_NAME = 'benchlark-store';

const isGone = (error: unknown) => (error as NodeJS.ErrnoException).code === 'ENOENT';

/**
 * Objects as files of one folder: `ab/cd/<sha256>`.
 *
 * A marker file written when the store is made tells an empty mount point from the store: without it nothing is read or
 * written, so that an unmounted disk doesn't fill the folder beneath it.
 */
export class FolderStore extends ObjectStore {
  readonly tempFolder: string;

  constructor(private readonly root: string) {
    super();
    this.tempFolder = join(root, 'incoming');
  }

  async open(mayCreate: boolean): Promise<void> {
    await writeMarker(this.root, MARKER_NAME, mayCreate);
    await mkdir(this.tempFolder, { recursive: true, mode: 0o700 });
    await this.checkReady();
  }

  async put(bytes: Readable): Promise<string> {
    await this.checkReady();
    const { path, sha256 } = await receiveFile(bytes, this.tempFolder);
    await this.keep(path, sha256);
    return sha256;
  }

  async keep(tempPath: string, sha256: string): Promise<void> {
    await this.checkReady();
    const path = this.pathOf(sha256);
    const folder = dirname(path);
    const isNewFolder = (await mkdir(folder, { recursive: true, mode: 0o700 })) !== undefined;
    await rename(tempPath, path);
    // The name must last as well as the bytes: a folder needs its own fsync (fsync(2)).
    await syncFolder(folder);
    if (isNewFolder) {
      await syncFolder(dirname(folder));
      await syncFolder(this.root);
    }
  }

  async read(sha256: string, range?: ByteRange): Promise<Readable> {
    const path = this.pathOf(sha256);
    try {
      const handle = await open(path, 'r');
      return handle.createReadStream({
        ...(range && { start: range.from, end: range.to }),
        highWaterMark: 1 << 18,
      });
    } catch (error) {
      if (isGone(error)) throw new ObjectMissingError(sha256);
      throw error;
    }
  }

  async stat(sha256: string): Promise<ObjectFacts | null> {
    try {
      const { size, mtime } = await stat(this.pathOf(sha256));
      return { sizeBytes: size, storedAt: mtime };
    } catch (error) {
      if (isGone(error)) return null;
      throw error;
    }
  }

  async *list(): AsyncIterable<ListedObject> {
    await this.checkReady();
    for (const first of await folderNames(this.root)) {
      if (!/^[0-9a-f]{2}$/.test(first)) continue;
      for (const second of await folderNames(join(this.root, first))) {
        for (const sha256 of await folderNames(join(this.root, first, second))) {
          if (!isSha256(sha256)) continue;
          const facts = await this.stat(sha256);
          if (facts) yield { sha256, ...facts };
        }
      }
    }
  }

  async remove(sha256: string): Promise<void> {
    await this.checkReady();
    await removeFile(this.pathOf(sha256));
  }

  async localCopy(sha256: string): Promise<LocalCopy> {
    const path = this.pathOf(sha256);
    if ((await this.stat(sha256)) === null) throw new ObjectMissingError(sha256);
    return { path, release: () => Promise.resolve() };
  }

  async freeBytes(): Promise<number> {
    const { bavail, bsize } = await statfs(this.root);
    return bavail * bsize;
  }

  async checkReady(): Promise<void> {
    try {
      await readFile(join(this.root, MARKER_NAME));
      await access(this.tempFolder, constants.W_OK);
    } catch (error) {
      const reason = isGone(error)
        ? 'its marker file is missing: is the disk mounted?'
        : 'it can’t be written to';
      throw new StorageNotReadyError(`the storage folder can’t be used: ${reason}`);
    }
  }

  private pathOf(sha256: string): string {
    assertSha256(sha256);
    return join(this.root, sha256.slice(0, 2), sha256.slice(2, 4), sha256);
  }
}

async function folderNames(path: string): Promise<string[]> {
  const names: string[] = [];
  for await (const entry of await opendir(path)) names.push(entry.name);
  return names.sort();
}
