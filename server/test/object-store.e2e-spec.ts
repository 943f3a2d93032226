import { createHash, randomBytes } from 'node:crypto';
import { mkdir, mkdtemp, readdir, rm, utimes, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import { FolderStore, MARKER_NAME } from '../src/storage/folder-store';
import { ObjectMissingError, StorageNotReadyError, type ObjectStore } from '../src/storage/object-store';
import { S3Store } from '../src/storage/s3-store';
import { SweepService } from '../src/storage/sweep.service';
import { createBench } from './support/bench';
import { startFakeS3 } from './support/fake-s3';
import { wavBytes } from './support/wav-bytes';

const sha256Of = (bytes: Buffer) => createHash('sha256').update(bytes).digest('hex');

describe.each(['folder', 's3'] as const)('object store (%s)', (kind) => {
  let root: string;
  let store: ObjectStore;
  let stop: () => Promise<void> = () => Promise.resolve();

  beforeAll(async () => {
    root = await mkdtemp(join(tmpdir(), 'benchlark-store-'));
    if (kind === 'folder') store = new FolderStore(join(root, 'store'));
    else {
      const fake = await startFakeS3(join(root, 's3'));
      stop = fake.stop;
      store = new S3Store({
        endpoint: fake.url,
        region: 'us-east-1',
        bucket: 'bench',
        prefix: 'objects/',
        accessKeyId: 'S3RVER',
        secretAccessKey: 'S3RVER',
        forcePathStyle: true,
        tempFolder: join(root, 'incoming'),
      });
    }
    await store.open(true);
  });
  afterAll(async () => {
    if (store instanceof S3Store) store.close();
    await stop();
    await rm(root, { recursive: true, force: true });
  });

  it.each([1, 1000, 20 * 1024 * 1024 + 1])(
    'gives back %i bytes as they were, under their hash',
    async (length) => {
      const bytes = randomBytes(length);
      const sha256 = await store.put(Readable.from([bytes.subarray(0, 7), bytes.subarray(7)]));
      expect(sha256).toBe(sha256Of(bytes));
      expect(sha256Of(await buffer(await store.read(sha256)))).toBe(sha256);
      expect((await store.stat(sha256))?.sizeBytes).toBe(length);
      expect(await readdir(store.tempFolder)).toEqual([]);
    },
  );

  it('reads a part, lists what is there, and removes it', async () => {
    const bytes = randomBytes(5_000);
    const sha256 = await store.put(Readable.from([bytes]));
    expect(await buffer(await store.read(sha256, { from: 10, to: 19 }))).toEqual(bytes.subarray(10, 20));
    const listed: string[] = [];
    for await (const object of store.list()) listed.push(object.sha256);
    expect(listed).toContain(sha256);
    const copy = await store.localCopy(sha256);
    await copy.release();
    await store.remove(sha256);
    await store.remove(sha256);
    expect(await store.stat(sha256)).toBeNull();
    await expect(store.read(sha256)).rejects.toThrow(ObjectMissingError);
    await expect(store.localCopy(sha256)).rejects.toThrow(ObjectMissingError);
  });

  it('keeps nothing of a stream that breaks', async () => {
    const broken = Readable.from(
      (function* () {
        yield randomBytes(100);
        throw new Error('the line went dead');
      })(),
    );
    await expect(store.put(broken)).rejects.toThrow('the line went dead');
    expect(await readdir(store.tempFolder)).toEqual([]);
  });

  it('takes nothing but a hash for a name', async () => {
    for (const name of ['../../etc/passwd', 'A'.repeat(64), '']) {
      await expect(store.read(name)).rejects.toThrow('64 hexadecimal digits');
    }
  });
});

describe('folder store', () => {
  let root: string;
  beforeEach(async () => {
    root = await mkdtemp(join(tmpdir(), 'benchlark-folder-'));
  });
  afterEach(() => rm(root, { recursive: true, force: true }));

  it('refuses an empty folder once captures are known: the disk is not mounted', async () => {
    await expect(new FolderStore(root).open(false)).rejects.toThrow(StorageNotReadyError);
    expect(await readdir(root)).toEqual([]);
  });

  it('refuses a folder that holds other things', async () => {
    await writeFile(join(root, 'holiday.jpg'), 'x');
    await expect(new FolderStore(root).open(true)).rejects.toThrow('other things');
  });

  it('writes nothing once its marker is gone', async () => {
    const store = new FolderStore(root);
    await store.open(true);
    await rm(join(root, MARKER_NAME));
    await expect(store.put(Readable.from([Buffer.from('x')]))).rejects.toThrow(StorageNotReadyError);
    await expect(store.checkReady()).rejects.toThrow('mounted');
  });
});

describe('the sweep', () => {
  it('removes old leftovers alone, and orphans only when told to', async () => {
    const bench = await createBench();
    try {
      const { sha256 } = await bench.uploaded(wavBytes({ seed: 51 }));
      const sweep = bench.app.get(SweepService);
      const incoming = join(bench.storeDir, 'incoming');
      const dayAgo = new Date(Date.now() - 25 * 3600_000);
      const place = async (path: string) => {
        await writeFile(path, 'left over');
        await utimes(path, dayAgo, dayAgo);
      };
      await place(join(incoming, 'old.part'));
      await writeFile(join(incoming, 'arriving.part'), 'x');
      const orphan = 'ab'.repeat(32);
      await mkdir(join(bench.storeDir, 'ab', 'ab'), { recursive: true });
      await place(join(bench.storeDir, 'ab', 'ab', orphan));
      const known = join(bench.storeDir, sha256.slice(0, 2), sha256.slice(2, 4), sha256);
      await utimes(known, dayAgo, dayAgo);

      const dry = await sweep.sweep({ removesOrphans: false });
      expect(dry).toMatchObject({ removedTempFiles: 1, orphans: [{ sha256: orphan }], removedOrphans: 0 });
      expect(await readdir(incoming)).toEqual(['arriving.part']);
      const wet = await sweep.sweep({ removesOrphans: true });
      expect(wet).toMatchObject({ removedTempFiles: 0, removedOrphans: 1 });
      expect(await sweep.sweep({ removesOrphans: false })).toMatchObject({ orphans: [] });
    } finally {
      await bench.close();
    }
  });

  it('forgets counts of attempts that are two days old, and no others', async () => {
    const bench = await createBench();
    try {
      await bench.dataSource.query(
        `INSERT INTO attempt (key, count, updated_at, blocked_until) VALUES
           ('old', 3, now() - interval '3 days', NULL),
           ('old but blocked', 9, now() - interval '3 days', now() + interval '1 hour'),
           ('new', 1, now(), NULL)`,
      );
      await bench.app.get(SweepService).forgetOldRows();
      const rows = await bench.dataSource.query<{ key: string }[]>('SELECT key FROM attempt ORDER BY key');
      expect(rows.map(({ key }) => key)).toEqual(['new', 'old but blocked']);
    } finally {
      await bench.close();
    }
  });
});
