import { createReadStream, createWriteStream } from 'node:fs';
import { mkdir, statfs } from 'node:fs/promises';
import { randomUUID } from 'node:crypto';
import { join } from 'node:path';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  HeadObjectCommand,
  ListObjectsV2Command,
  S3Client,
} from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
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
import { PART_ENDING, receiveFile, removeFile } from './receive-file';

export interface S3Place {
  readonly endpoint?: string;
  readonly region: string;
  readonly bucket: string;
  /** Put before every key, e.g. `bench/`. */
  readonly prefix: string;
  readonly accessKeyId?: string;
  readonly secretAccessKey?: string;
  readonly forcePathStyle: boolean;
  /** A folder of this machine for files that are arriving and for copies that are being analysed. */
  readonly tempFolder: string;
}

const PART_BYTES = 16 * 1024 * 1024;

const isMissing = (error: unknown) =>
  error instanceof Error && ['NoSuchKey', 'NotFound', 'NoSuchBucket'].includes(error.name);

/** Objects in a bucket of any S3-compatible store, keyed by their SHA-256. */
export class S3Store extends ObjectStore {
  readonly tempFolder: string;
  readonly #client: S3Client;

  constructor(private readonly place: S3Place) {
    super();
    this.tempFolder = place.tempFolder;
    // Which Node versions we run on is said in our own documents.
    process.env['AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED'] ??= 'true';
    this.#client = new S3Client({
      region: place.region,
      endpoint: place.endpoint,
      forcePathStyle: place.forcePathStyle,
      // Without keys the SDK's own chain is used: environment, profile, instance role.
      ...(place.accessKeyId && {
        credentials: { accessKeyId: place.accessKeyId, secretAccessKey: place.secretAccessKey ?? '' },
      }),
      // The SDK's default trailing checksums are stored as part of the bytes by stores that don't know them.
      requestChecksumCalculation: 'WHEN_REQUIRED',
      responseChecksumValidation: 'WHEN_REQUIRED',
      maxAttempts: 3,
    });
  }

  async open(): Promise<void> {
    await mkdir(this.tempFolder, { recursive: true, mode: 0o700 });
    await this.checkReady();
  }

  async put(bytes: Readable): Promise<string> {
    const { path, sha256 } = await receiveFile(bytes, this.tempFolder);
    await this.keep(path, sha256);
    return sha256;
  }

  async keep(tempPath: string, sha256: string): Promise<void> {
    await new Upload({
      client: this.#client,
      params: { ...this.at(sha256), Body: createReadStream(tempPath) },
      partSize: PART_BYTES,
      queueSize: 2,
    }).done();
    await removeFile(tempPath);
  }

  async read(sha256: string, range?: ByteRange): Promise<Readable> {
    try {
      const Range = range && `bytes=${range.from}-${range.to}`;
      const { Body } = await this.#client.send(new GetObjectCommand({ ...this.at(sha256), Range }));
      return Body as Readable; // in Node the SDK's body is an IncomingMessage
    } catch (error) {
      if (isMissing(error)) throw new ObjectMissingError(sha256);
      throw error;
    }
  }

  async stat(sha256: string): Promise<ObjectFacts | null> {
    try {
      const { ContentLength, LastModified } = await this.#client.send(new HeadObjectCommand(this.at(sha256)));
      return { sizeBytes: ContentLength ?? 0, storedAt: LastModified ?? new Date(0) };
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
  }

  async *list(): AsyncIterable<ListedObject> {
    const { bucket: Bucket, prefix: Prefix } = this.place;
    let ContinuationToken: string | undefined;
    do {
      const page = await this.#client.send(new ListObjectsV2Command({ Bucket, Prefix, ContinuationToken }));
      for (const { Key = '', Size = 0, LastModified = new Date(0) } of page.Contents ?? []) {
        const sha256 = Key.slice(Prefix.length);
        if (isSha256(sha256)) yield { sha256, sizeBytes: Size, storedAt: LastModified };
      }
      ContinuationToken = page.NextContinuationToken;
    } while (ContinuationToken);
  }

  async remove(sha256: string): Promise<void> {
    await this.#client.send(new DeleteObjectCommand(this.at(sha256)));
  }

  async localCopy(sha256: string): Promise<LocalCopy> {
    const path = join(this.tempFolder, `${randomUUID()}${PART_ENDING}`);
    try {
      await pipeline(await this.read(sha256), createWriteStream(path, { flags: 'wx', mode: 0o600 }));
    } catch (error) {
      await removeFile(path);
      throw error;
    }
    return { path, release: () => removeFile(path) };
  }

  async freeBytes(): Promise<number> {
    const { bavail, bsize } = await statfs(this.tempFolder);
    return bavail * bsize;
  }

  async checkReady(): Promise<void> {
    try {
      await this.#client.send(new HeadBucketCommand({ Bucket: this.place.bucket }));
    } catch (error) {
      throw new StorageNotReadyError('the bucket can’t be reached', { cause: error });
    }
  }

  /** Ends the idle connections. */
  close(): void {
    this.#client.destroy();
  }

  private at(sha256: string): { Bucket: string; Key: string } {
    assertSha256(sha256);
    return { Bucket: this.place.bucket, Key: this.place.prefix + sha256 };
  }
}
