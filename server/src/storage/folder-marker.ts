import { mkdir, open, readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { StorageNotReadyError } from './object-store';

/** Makes a rename or a new entry in the folder last. */
export async function syncFolder(path: string): Promise<void> {
  const handle = await open(path, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

/**
 * Marks a new store; one that has its marker already is left as it is.
 *
 * @param mayCreate - false once the database knows of stored objects: an empty folder then is a disk that isn't mounted
 * @throws StorageNotReadyError when there is no marker and none may be made, or when the folder holds other things
 */
export async function writeMarker(root: string, name: string, mayCreate: boolean): Promise<void> {
  const names = await readNames(root);
  if (names?.includes(name)) return;
  if (!mayCreate) {
    throw new StorageNotReadyError(
      'the storage folder has no marker file, yet captures are stored: is the disk mounted?',
    );
  }
  if (names && names.length > 0) {
    throw new StorageNotReadyError(
      'the storage folder holds other things and no marker file: nothing was written',
    );
  }
  await mkdir(root, { recursive: true, mode: 0o700 });
  const handle = await open(join(root, name), 'w', 0o600);
  try {
    await handle.writeFile(
      'The bytes of captures and traces, each file named by its SHA-256. Do not edit.\n',
    );
    await handle.sync();
  } finally {
    await handle.close();
  }
  await syncFolder(root);
}

async function readNames(path: string): Promise<string[] | null> {
  try {
    return await readdir(path);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw error;
  }
}
