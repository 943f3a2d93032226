import type { Readable } from 'node:stream';

/** First and last byte, both included, as in an HTTP range. */
export interface ByteRange {
  readonly from: number;
  readonly to: number;
}

export interface ObjectFacts {
  readonly sizeBytes: number;
  readonly storedAt: Date;
}

export interface ListedObject extends ObjectFacts {
  readonly sha256: string;
}

/** A file on this machine that holds an object's bytes; `release` once it is no longer needed. */
export interface LocalCopy {
  readonly path: string;
  release(): Promise<void>;
}

/** Bytes under the SHA-256 of what they are. Storing is atomic and lasting: after it returns, a power cut loses nothing. */
export abstract class ObjectStore {
  /** Where files that are still arriving are written, so that keeping one is a rename where possible. */
  abstract readonly tempFolder: string;
  /**
   * Prepares the place.
   *
   * @param mayCreate - whether a new store may be made here
   * @throws StorageNotReadyError when it isn't the one it should be
   */
  abstract open(mayCreate: boolean): Promise<void>;
  /** Stores a stream and tells its SHA-256. */
  abstract put(bytes: Readable): Promise<string>;
  /**
   * Takes over a file from the temp folder whose hash is known and whose bytes are synced.
   * An object of that name is replaced: equal bytes if it was sound, healed if it was not.
   */
  abstract keep(tempPath: string, sha256: string): Promise<void>;
  /** @throws ObjectMissingError */
  abstract read(sha256: string, range?: ByteRange): Promise<Readable>;
  abstract stat(sha256: string): Promise<ObjectFacts | null>;
  abstract list(): AsyncIterable<ListedObject>;
  /** Removes an object; one that is not there is no error. */
  abstract remove(sha256: string): Promise<void>;
  /** @throws ObjectMissingError */
  abstract localCopy(sha256: string): Promise<LocalCopy>;
  /** Bytes that can still be written on the temp folder's disk. */
  abstract freeBytes(): Promise<number>;
  /** @throws StorageNotReadyError when the store can't be used at the moment */
  abstract checkReady(): Promise<void>;
}

export class StorageNotReadyError extends Error {
  override readonly name = 'StorageNotReadyError';
}

export class ObjectMissingError extends Error {
  override readonly name = 'ObjectMissingError';

  constructor(readonly sha256: string) {
    super(`no object ${sha256} in the store`);
  }
}

const SHA256_HEX = /^[0-9a-f]{64}$/;

export function isSha256(text: string): boolean {
  return SHA256_HEX.test(text);
}

/** @throws Error when the text could be anything but a hash: it becomes a path */
export function assertSha256(text: string): void {
  if (!isSha256(text)) throw new Error('an object is named by 64 hexadecimal digits');
}
